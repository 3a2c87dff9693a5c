import { expect } from 'vitest'
import type { Db } from '@/db/client'
import type { Ctx, PersonCtx } from '@/lib/server/ctx'
import { AppError, type ErrorCode } from '@/lib/shared/errors'
import { newId } from '@/lib/shared/ids'
import { toWallClock } from '@/lib/services/steps/to-wall-clock'
import { auditRows, makeCtx, NOW, TIME_ZONE, type TestPerson } from './factories'

/** The unit's wall clock at a moment, as a form sends it. */
export const at = (ms: number, timeZone: string = TIME_ZONE) => toWallClock(ms, timeZone)

/** The refusal that a call throws. */
export function refusalOf(run: () => unknown): AppError {
  try {
    run()
  } catch (error) {
    if (error instanceof AppError) return error
    throw error
  }
  throw new Error('It was not refused.')
}

/** Expects a refusal with this code, and, when a field is named, with words at that field. */
export function expectRefusal(run: () => unknown, code: ErrorCode, field?: string, words?: RegExp): void {
  const refusal = refusalOf(run)
  expect(refusal.code).toBe(code)
  if (field !== undefined) expect(Object.keys(refusal.fields ?? {})).toEqual([field])
  if (words !== undefined) expect(field === undefined ? refusal.message : (refusal.fields?.[field] ?? '')).toMatch(words)
}

/** Rows of every table, by table. */
export function countRows(db: Db): Record<string, number> {
  const tables = db.$client
    .prepare("select name from sqlite_master where type = 'table' and name not like 'sqlite_%'")
    .pluck()
    .all() as string[]
  return Object.fromEntries(
    tables.map((name) => [name, db.$client.prepare(`select count(*) from "${name}"`).pluck().get() as number]),
  )
}

/** Everything that is on record, for comparing before and after. */
export function dumpRows(db: Db, except: readonly string[] = []): Record<string, unknown[]> {
  const tables = Object.keys(countRows(db)).filter((name) => !except.includes(name))
  return Object.fromEntries(tables.map((name) => [name, db.$client.prepare(`select * from "${name}"`).all()]))
}

type Verb<Input, Answer> = (ctx: Ctx, input: Input) => Answer
type World = { db: Db; outsider: TestPerson }

/** A person of another unit gets "not found", and a person whose role lacks the action "forbidden": nothing changes but the audit log. */
export function expectDoor<Input>(world: World, verb: Verb<Input, unknown>, input: Input, wrongRole: TestPerson | null): void {
  const { db, outsider } = world
  const before = dumpRows(db, ['audit_log'])
  const denied = auditRows(db, 'access.denied').length
  expectRefusal(() => verb(makeCtx(db, outsider), input), 'NOT_FOUND')
  if (wrongRole) expectRefusal(() => verb(makeCtx(db, wrongRole), input), 'FORBIDDEN')
  expect(auditRows(db, 'access.denied')).toHaveLength(denied + (wrongRole ? 2 : 1))
  expect(dumpRows(db, ['audit_log'])).toEqual(before)
}

/** When the audit row of the change cannot be written, nothing of the change stays. */
export function expectNothingLeft<Input>(ctx: PersonCtx, verb: Verb<Input, unknown>, input: Input, auditAction: string): void {
  const { db } = ctx
  const before = dumpRows(db)
  db.$client.exec(`create temp trigger planned_fault before insert on audit_log when new.action = '${auditAction}'
    begin select raise(abort, 'planned fault'); end`)
  expect(() => verb(ctx, input)).toThrow('planned fault')
  db.$client.exec('drop trigger planned_fault')
  expect(dumpRows(db)).toEqual(before)
}

/** The same request sent twice with one idempotency key: the same answer, and nothing new the second time. Other values with that key are a conflict. */
export function expectOnce<Input extends object, Answer>(
  db: Db,
  person: TestPerson,
  verb: Verb<Input, Answer>,
  input: Input,
  other: Input,
  now: number = NOW,
): Answer {
  const ctx = makeCtx(db, person, now, { idempotencyKey: newId() })
  const first = verb(ctx, input)
  const after = dumpRows(db)
  expect(verb({ ...ctx, requestId: newId() }, input)).toEqual(first)
  expect(dumpRows(db)).toEqual(after)
  expectRefusal(() => verb({ ...ctx, requestId: newId() }, other), 'CONFLICT')
  expect(dumpRows(db)).toEqual(after)
  return first
}
