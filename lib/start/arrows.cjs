// Which folder may import from which, once for the editor (eslint.config.mjs) and once for the gate (.dependency-cruiser.cjs).
// The arrows point one way: app to components to browser-safe lib, and app and jobs to lib/services to db.
// `may` and `mayAsType` are beginnings of paths from the project root; `packagesNot` are packages that the folder stays free of.

const DATABASE_PACKAGES = ['drizzle-orm', 'better-sqlite3', 'better-auth/adapters']
const SERVER_PACKAGES = [
  ...DATABASE_PACKAGES,
  'better-auth(?!/(react|client))',
  'nodemailer',
  'node-cron',
  'pino',
  'server-only',
  'node:',
]
const PAGE_PACKAGES = ['react', 'react-dom', 'next', 'recharts', '@tanstack/']
const CORE_WORDS = ['lib/weaning/']

const ARROWS = [
  {
    name: 'pages',
    files: ['app/**'],
    except: ['app/api/**'],
    may: [
      'app/',
      'components/',
      'lib/services/',
      'lib/access/',
      'lib/client/',
      'lib/schemas/',
      'lib/shared/',
      'lib/server/session',
      'lib/server/read-for-page',
      ...CORE_WORDS,
    ],
    packagesNot: DATABASE_PACKAGES,
  },
  {
    name: 'routes',
    files: ['app/api/**'],
    except: [],
    may: ['app/api/', 'lib/server/', 'lib/schemas/', 'lib/services/', 'lib/shared/'],
    packagesNot: DATABASE_PACKAGES,
  },
  { name: 'ui', files: ['components/ui/**'], except: [], may: ['components/ui/', 'lib/shared/'], packagesNot: SERVER_PACKAGES },
  {
    name: 'forms',
    files: ['components/forms/**'],
    except: [],
    may: ['components/ui/', 'components/forms/', 'lib/client/', 'lib/shared/'],
    mayAsType: ['lib/schemas/'],
    packagesNot: SERVER_PACKAGES,
  },
  {
    name: 'components',
    files: ['components/**'],
    except: ['components/ui/**', 'components/forms/**'],
    may: ['components/', 'lib/client/', 'lib/schemas/', 'lib/access/policy', 'lib/shared/', ...CORE_WORDS],
    packagesNot: SERVER_PACKAGES,
  },
  { name: 'weaning', files: ['lib/weaning/**'], except: [], may: ['lib/weaning/'], packagesOnly: ['date-fns', '@date-fns/tz'] },
  { name: 'statistics', files: ['lib/statistics/**'], except: [], may: ['lib/statistics/'], packagesOnly: [] },
  {
    name: 'schemas',
    files: ['lib/schemas/**'],
    except: [],
    may: ['lib/schemas/', 'lib/shared/', ...CORE_WORDS],
    packagesOnly: ['zod'],
  },
  {
    name: 'policy',
    files: ['lib/access/policy.ts'],
    except: [],
    may: [],
    mayAsType: ['lib/weaning/vocabulary'],
    packagesOnly: [],
  },
  {
    name: 'door',
    files: ['lib/access/**'],
    except: ['lib/access/policy.ts'],
    may: ['lib/access/', 'db/queries/', 'lib/server/audit', 'lib/shared/'],
    mayAsType: ['db/', 'lib/server/ctx'],
    packagesNot: PAGE_PACKAGES,
  },
  {
    name: 'demo',
    files: ['lib/demo/**'],
    except: [],
    // The hash over a decision is made in one place only, so that invented decisions carry the same kind.
    may: [
      'lib/demo/',
      'lib/shared/',
      'lib/schemas/decision-statement',
      'lib/services/decisions/content-hash',
      'db/seed',
      ...CORE_WORDS,
    ],
    mayAsType: ['db/'],
    packagesNot: [...SERVER_PACKAGES, ...PAGE_PACKAGES],
  },
  {
    name: 'services',
    files: ['lib/services/**'],
    except: [],
    may: [
      'lib/demo/',
      ...['lib/services/', 'lib/access/', 'lib/statistics/', 'lib/schemas/', 'lib/mail/', 'lib/server/', 'lib/shared/', 'db/'],
      ...CORE_WORDS,
    ],
    mayNot: ['lib/server/http', 'lib/server/boot', 'lib/server/session.ts'],
    packagesNot: PAGE_PACKAGES,
  },
  {
    name: 'boot',
    files: ['lib/server/boot.ts'],
    except: [],
    may: ['lib/server/', 'lib/services/', 'lib/shared/', 'db/', 'jobs/'],
    packagesNot: PAGE_PACKAGES,
  },
  {
    name: 'server',
    files: ['lib/server/**'],
    except: ['lib/server/boot.ts'],
    // auth.ts hands invitation and reset letters to the outbox; nothing else here calls a verb.
    may: ['lib/server/', 'lib/access/', 'lib/shared/', 'db/', 'lib/services/mail/queue-account-mail'],
    packagesNot: ['react-dom', 'recharts', '@tanstack/'],
  },
  {
    name: 'mail',
    files: ['lib/mail/**'],
    except: [],
    may: ['lib/mail/', 'lib/shared/'],
    packagesNot: [...DATABASE_PACKAGES, ...PAGE_PACKAGES],
  },
  {
    name: 'client',
    files: ['lib/client/**'],
    except: [],
    may: ['lib/client/', 'lib/schemas/', 'lib/shared/'],
    packagesNot: SERVER_PACKAGES,
  },
  {
    name: 'shared',
    files: ['lib/shared/**'],
    except: [],
    may: ['lib/shared/'],
    packagesNot: [...SERVER_PACKAGES, ...PAGE_PACKAGES],
  },
  {
    name: 'db',
    files: ['db/**'],
    except: [],
    may: ['db/', 'lib/weaning/vocabulary'],
    mayAsType: ['lib/weaning/protocol', 'lib/weaning/readings', 'lib/weaning/screen/verdict'],
    packagesNot: [...PAGE_PACKAGES, 'zod', 'better-auth'],
  },
  {
    name: 'jobs',
    files: ['jobs/**'],
    except: [],
    may: ['jobs/', 'lib/services/', 'lib/server/', 'lib/shared/'],
    packagesNot: [...DATABASE_PACKAGES, ...PAGE_PACKAGES],
  },
]

/** A glob with `**` at its end, or a plain path, as the source of a regular expression over paths from the project root. */
function toPathPattern(glob) {
  const escaped = glob.replace(/\*\*$/, '').replace(/[.()]/g, '\\$&')
  return glob.endsWith('**') ? `^${escaped}` : `^${escaped}$`
}

module.exports = { ARROWS, toPathPattern }
