import { ESLint, RuleTester } from 'eslint'
import tseslint from 'typescript-eslint'
import { describe, expect, it } from 'vitest'
import { saysServerOnly, verbHasDoor } from '@/lib/start/eslint-rules.mjs'

RuleTester.describe = describe
RuleTester.it = it
const tester = new RuleTester({ languageOptions: { parser: tseslint.parser } })

const GOOD_WRITE = `export function recordThing(ctx: Ctx, input: Input) {
  const found = authorize(ctx, 'settings.record', input)
  return once(ctx, 'settings.record', input, (tx) => { writeAudit(tx, ctx, {}); return found })
}`

tester.run('verb-has-door', verbHasDoor, {
  valid: [
    GOOD_WRITE,
    `export function readThing(ctx: Ctx) { return list(authorize(ctx, 'today.read', {})) }`,
    `export const readThing = (ctx: PersonCtx) => authorize(ctx, 'today.read', {})`,
    // The door or the audit row may stand in a function of the same file.
    `export function f(ctx: Ctx) { const a = enter(ctx); return once(ctx, 'x', a, (tx) => save(tx)) }
     function enter(ctx: Ctx) { return authorize(ctx, 'x', {}) }
     function save(tx) { writeAudit(tx, {}) }`,
    `export function toThingDto(row: Row) { return { id: row.id } }`,
    `export function queueThing(tx: Tx, thing: Thing) { insertThing(tx, thing) }`,
    `function inner(ctx: Ctx) { return ctx.db.transaction(() => 1) }`,
    `/** Doc. */\n// no-door: called at the start of the program only\nexport function f(ctx: Ctx) { return ctx.db.transaction((tx) => 1) }`,
  ],
  invalid: [
    { code: `export function readThing(ctx: Ctx) { return list(ctx.db) }`, errors: [{ messageId: 'noDoor' }] },
    { code: `export const readThing = (ctx: Ctx) => list(ctx.db)`, errors: [{ messageId: 'noDoor' }] },
    { code: `function readThing(ctx: Ctx) { return list(ctx.db) }\nexport { readThing }`, errors: [{ messageId: 'noDoor' }] },
    { code: `export async function readThing(ctx: PersonCtx) { return await list(ctx.db) }`, errors: [{ messageId: 'noDoor' }] },
    { code: GOOD_WRITE.replace(/const found = .*\n/, ''), errors: [{ messageId: 'noDoor' }] },
    { code: GOOD_WRITE.replace('writeAudit(tx, ctx, {});', ''), errors: [{ messageId: 'noAudit' }] },
    {
      code: `export function f(db: Db) { return db.transaction((tx) => 1) }`,
      errors: [{ messageId: 'noDoor' }, { messageId: 'noAudit' }],
    },
    {
      code: `export function f(ctx: Ctx) { once(ctx, 'x', 1, (tx) => writeAudit(tx)); return authorize(ctx, 'x', {}) }`,
      errors: [{ messageId: 'lateDoor' }],
    },
    // An exemption needs a reason, and stands directly above.
    { code: `// no-door:\nexport function f(ctx: Ctx) { return 1 }`, errors: [{ messageId: 'noDoor' }] },
    {
      code: `// no-door: called at the start only\n\nexport function f(ctx: Ctx) { return 1 }`,
      errors: [{ messageId: 'noDoor' }],
    },
    { code: `export { recordThing } from './record-thing'`, errors: [{ messageId: 'reExport' }] },
    { code: `export * from './record-thing'`, errors: [{ messageId: 'reExport' }] },
  ],
})

tester.run('says-server-only', saysServerOnly, {
  valid: [
    `import 'server-only'\nimport { db } from '@/db/client'`,
    `import type { Tx } from '@/db/client'\nexport const f = (tx: Tx) => tx`,
    `import { formatTime } from '@/lib/shared/format'`,
  ],
  invalid: [
    { code: `import { openDatabase } from '@/db/client'`, errors: [{ messageId: 'missing' }] },
    { code: `import { createHash } from 'node:crypto'`, errors: [{ messageId: 'missing' }] },
    { code: `import { authorize } from '@/lib/access/door'`, errors: [{ messageId: 'missing' }] },
  ],
})

/**
 * The project's own lint over a planted text, in the place of a file that exists. Answers the names of the rules that fired. The planted
 * text stays in the compiler's memory, so a file that other plants import must not be chosen as the place.
 */
const lint = new ESLint()
async function firedRules(filePath: string, code: string): Promise<(string | null)[]> {
  const [result] = await lint.lintText(code, { filePath })
  return (result?.messages ?? []).map((message) => message.ruleId ?? message.message)
}

const IMPORTS = '@typescript-eslint/no-restricted-imports'
const WEANING = 'lib/weaning/vocabulary.ts'
const SERVICE = 'lib/services/settings/record.ts'
const SHARED = 'lib/shared/format.ts'

describe('planted faults are caught', { timeout: 60_000 }, () => {
  it.each([
    ['a package in the pure core', WEANING, `import { z } from 'zod'\nexport const a = z`, IMPORTS],
    ['a Node module in the pure core', WEANING, `import { readFileSync } from 'node:fs'\nexport const a = readFileSync`, IMPORTS],
    [
      'the database in the pure core',
      WEANING,
      `import { openDatabase } from '@/db/client'\nexport const a = openDatabase`,
      IMPORTS,
    ],
    ['a climb out of the pure core', WEANING, `import { newId } from '../shared/ids'\nexport const a = newId`, IMPORTS],
    ['shared code in the pure core', WEANING, `import { newId } from '@/lib/shared/ids'\nexport const a = newId`, IMPORTS],
    ['the clock in the pure core', WEANING, `export const a = () => Date.now()`, 'no-restricted-properties'],
    ['a new date in the pure core', WEANING, `export const a = () => new Date()`, 'no-restricted-syntax'],
    ['chance in the pure core', WEANING, `export const a = () => Math.random()`, 'no-restricted-properties'],
    ['the environment in the pure core', WEANING, `export const a = () => process.version`, 'no-restricted-globals'],
    ['anything of ours in shared code', SHARED, `import { POLICY } from '@/lib/access/policy'\nexport const a = POLICY`, IMPORTS],
    ['React in a verb', SERVICE, `import { useState } from 'react'\nexport const a = useState`, IMPORTS],
    ['Next in a verb', SERVICE, `import { headers } from 'next/headers'\nexport const a = headers`, IMPORTS],
    ['the request wrapper in a verb', SERVICE, `import { handle } from '@/lib/server/http'\nexport const a = handle`, IMPORTS],
    [
      'a rule of the core as a value in the database',
      'db/queries/audit-walk.ts',
      `import { a } from '@/lib/weaning/protocol'\nexport const b = a`,
      IMPORTS,
    ],
    [
      'a schema in the database',
      'db/queries/audit-walk.ts',
      `import { a } from '@/lib/schemas/settings'\nexport const b = a`,
      IMPORTS,
    ],
    ['the database in a route', 'app/api/health/route.ts', `import { a } from '@/db/client'\nexport const GET = a`, IMPORTS],
    ['drizzle in a route', 'app/api/health/route.ts', `import { sql } from 'drizzle-orm'\nexport const GET = sql`, IMPORTS],
    ['the database in a job', 'jobs/run.ts', `import { a } from '@/db/client'\nexport const b = a`, IMPORTS],
    [
      'a verb in browser code',
      'lib/schemas/settings.ts',
      `import { a } from '@/lib/services/settings/record'\nexport const b = a`,
      IMPORTS,
    ],
    ['a setting read past its module', SERVICE, `export const a = process.env.SECRET`, 'no-restricted-properties'],
    ['any', SHARED, `export const a = (b: any) => b`, '@typescript-eslint/no-explicit-any'],
    ['a non-null assertion', SHARED, `export const a = (b: string | null) => b!`, '@typescript-eslint/no-non-null-assertion'],
    ['a barrel', SHARED, `export * from './ids'`, 'no-restricted-syntax'],
    ['a default export', SHARED, `export default 1`, 'no-restricted-syntax'],
    ['a forgotten promise', SHARED, `export function a() { Promise.resolve(1) }`, '@typescript-eslint/no-floating-promises'],
    [
      'a file that is too long',
      SHARED,
      Array.from({ length: 301 }, (_, n) => `export const b${n} = ${n}`).join('\n'),
      'max-lines',
    ],
    ['a function that is too long', SHARED, `export function a() {\n${'console.log(1)\n'.repeat(91)}}`, 'max-lines-per-function'],
  ])('%s', async (_what, file, code, rule) => {
    expect(await firedRules(file, code)).toContain(rule)
  })

  const withDb = (body: string) =>
    `import 'server-only'\nimport type { Db, Tx } from '../client'\nimport { hospitals } from '../schema'\n${body}`

  it.each([
    ['an async callback', `export const f = (db: Db) => db.transaction(async (tx) => { tx.delete(hospitals).run() })`],
    ['a callback that hands back a promise', `export const f = (db: Db) => db.transaction(() => Promise.resolve(1))`],
    [
      'a callback that hands back an unfinished builder',
      `export const f = (db: Db) => db.transaction((tx) => tx.delete(hospitals))`,
    ],
    [
      'a named async callback',
      `async function g(tx: Tx) { tx.delete(hospitals).run() }\nexport const f = (db: Db) => db.transaction(g)`,
    ],
  ])('a transaction with %s', async (_what, code) => {
    expect(await firedRules('db/queries/start.ts', withDb(code))).toContain('daybreath/no-waiting-transaction')
  })

  it('a builder that nobody runs', async () => {
    const code = withDb(`export function f(tx: Tx): void { tx.delete(hospitals) }`)
    expect(await firedRules('db/queries/start.ts', code)).toContain('@typescript-eslint/no-floating-promises')
  })
})

describe('what is right stays quiet', { timeout: 60_000 }, () => {
  it.each([
    ['a neighbour in the pure core', WEANING, `import { readings } from './readings'\nexport const a = readings`],
    [
      'a type of the core in the database',
      'db/queries/audit-walk.ts',
      `import 'server-only'\nimport type { ProtocolContent } from '@/lib/weaning/protocol'\nexport type A = ProtocolContent`,
    ],
    [
      'the word lists in the database',
      'db/queries/audit-walk.ts',
      `import 'server-only'\nimport { SEXES } from '@/lib/weaning/vocabulary'\nexport const a = SEXES`,
    ],
    [
      'a finished builder in a transaction',
      'db/queries/start.ts',
      `import 'server-only'\nimport type { Db } from '../client'\nimport { hospitals } from '../schema'\nexport const f = (db: Db) => db.transaction((tx) => tx.select().from(hospitals).all())`,
    ],
  ])('%s', async (_what, file, code) => {
    expect(await firedRules(file, code)).toEqual([])
  })
})
