import { execFile } from 'node:child_process'
import { copyFileSync, mkdirSync, symlinkSync, writeFileSync } from 'node:fs'
import { dirname, join, resolve } from 'node:path'
import { promisify } from 'node:util'
import { describe, expect, it } from 'vitest'
import { makeTestFolder } from '../helpers/database'

const runFile = promisify(execFile)

/** Names of the rules that the gate reports for a small project made of these files. */
async function reportedRules(files: Record<string, string>): Promise<string[]> {
  const folder = makeTestFolder()
  for (const [path, text] of Object.entries(files)) {
    mkdirSync(dirname(join(folder, path)), { recursive: true })
    writeFileSync(join(folder, path), text)
  }
  copyFileSync('tsconfig.json', join(folder, 'tsconfig.json'))
  copyFileSync('package.json', join(folder, 'package.json'))
  symlinkSync(resolve('node_modules'), join(folder, 'node_modules'))
  const tops = [...new Set(Object.keys(files).map((path) => path.split('/')[0] ?? ''))]
  const args = [
    resolve('node_modules/dependency-cruiser/bin/dependency-cruise.mjs'),
    '--config',
    resolve('.dependency-cruiser.cjs'),
  ]
  const done = await runFile(process.execPath, [...args, '--output-type', 'json', ...tops], { cwd: folder }).catch(
    (error: { stdout: string }) => error,
  )
  const report = JSON.parse(done.stdout) as { summary: { violations: { rule: { name: string } }[] } }
  return report.summary.violations.map((violation) => violation.rule.name)
}

const shared = { 'lib/shared/ids.ts': 'export const newId = 1' }
const client = { 'db/client.ts': 'export const db = 1\nexport type Db = 1' }

describe('import directions', { timeout: 60_000 }, () => {
  it.each([
    [
      'the core climbs out by a relative path',
      { ...shared, 'lib/weaning/a.ts': `import { newId } from '../shared/ids'\nexport const a = newId` },
      'weaning-arrow',
    ],
    ['the core takes a package', { 'lib/weaning/a.ts': `import { z } from 'zod'\nexport const a = z` }, 'weaning-pure'],
    [
      'the core takes a Node module',
      { 'lib/weaning/a.ts': `import { join } from 'node:path'\nexport const a = join` },
      'weaning-pure',
    ],
    [
      'a page reads the database',
      { ...client, 'app/page.tsx': `import { db } from '../db/client'\nexport default () => db` },
      'pages-arrow',
    ],
    [
      'a component reads the database for its types',
      { ...client, 'components/today/a.tsx': `import type { Db } from '@/db/client'\nexport type A = Db` },
      'components-arrow',
    ],
    [
      'a component takes the database package',
      { 'components/today/a.ts': `import { sql } from 'drizzle-orm'\nexport const a = sql` },
      'components-no-package',
    ],
    [
      'browser code takes a Node module',
      { 'lib/client/a.ts': `import { join } from 'node:path'\nexport const a = join` },
      'client-no-package',
    ],
    [
      'a verb takes React',
      { 'lib/services/a/b.ts': `import { useState } from 'react'\nexport const a = useState` },
      'services-no-package',
    ],
    [
      'the database takes a rule as a value',
      {
        'lib/weaning/protocol.ts': 'export const a = 1',
        'db/schema/a.ts': `import { a } from '@/lib/weaning/protocol'\nexport const b = a`,
      },
      'db-type-only',
    ],
    [
      'somebody imports from app',
      { 'app/a.ts': 'export const a = 1', 'lib/mail/b.ts': `import { a } from '@/app/a'\nexport const b = a` },
      'not-from-app',
    ],
    [
      'two files import each other',
      {
        'lib/shared/a.ts': `import { b } from './b'\nexport const a = () => b`,
        'lib/shared/b.ts': `import { a } from './a'\nexport const b = () => a`,
      },
      'no-cycle',
    ],
    ['a file that is not there', { 'lib/shared/a.ts': `import { b } from './gone'\nexport const a = b` }, 'resolvable'],
    [
      'a package of the tests in the product',
      { 'lib/server/a.ts': `import { build } from 'vite'\nexport const a = build` },
      'declared',
    ],
  ])('refuses it when %s', async (_what, files, rule) => {
    expect(await reportedRules(files)).toContain(rule)
  })

  it('is quiet over what is right', async () => {
    const files = {
      ...shared,
      ...client,
      'lib/weaning/vocabulary.ts': `export const WORDS = ['a'] as const`,
      'lib/weaning/protocol.ts': `import type { WORDS } from './vocabulary'\nexport type P = typeof WORDS`,
      'db/schema/a.ts': `import { WORDS } from '@/lib/weaning/vocabulary'\nimport type { P } from '@/lib/weaning/protocol'\nexport const a: P = WORDS`,
      'lib/services/a/b.ts': `import { db } from '@/db/client'\nimport { newId } from '@/lib/shared/ids'\nexport const a = [db, newId]`,
      'app/page.tsx': `import { a } from '@/lib/services/a/b'\nexport default () => a`,
    }
    expect(await reportedRules(files)).toEqual([])
  })
})
