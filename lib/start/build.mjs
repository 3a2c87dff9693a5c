// npm run build: makes the production build, when the sources have changed since the last one. Needs no secret and no database.
import { existsSync } from 'node:fs'
import { join } from 'node:path'
import { main, mustRun, NEXT, ROOT, say } from './process.mjs'
import { setup } from './setup.mjs'
import { hashFiles, isStamped, removeStamp, writeStamp } from './stamp.mjs'

/** What the build reads. Tests and these scripts are no part of it. */
const SOURCES = [
  ...[
    'app',
    'components',
    'db',
    'jobs',
    'lib/access',
    'lib/client',
    'lib/demo',
    'lib/mail',
    'lib/schemas',
    'lib/server',
    'lib/services',
  ],
  ...['lib/shared', 'lib/statistics', 'lib/weaning', 'public', 'instrumentation.ts', 'proxy.ts', 'next.config.mjs'],
  ...['postcss.config.mjs', 'tailwind.config.ts', 'tsconfig.json', 'package-lock.json'],
]

/** The folder of the build; another one (DAYBREATH_DIST) lets two builds stand side by side. */
export function distFolder() {
  return process.env.DAYBREATH_DIST ?? '.next'
}

/** Builds when needed. */
export async function build() {
  await setup()
  const stamp = join(ROOT, distFolder(), 'daybreath-build')
  const hash = hashFiles(ROOT, SOURCES, [process.versions.node])
  if (isStamped(stamp, hash) && existsSync(join(ROOT, distFolder(), 'BUILD_ID'))) return
  say('Building the application. This takes about a minute.')
  removeStamp(stamp)
  const env = { NEXT_TELEMETRY_DISABLED: '1', NODE_ENV: 'production' }
  await mustRun('The build', process.execPath, [NEXT, 'build'], { env })
  writeStamp(stamp, hash)
}

main(import.meta.url, build)
