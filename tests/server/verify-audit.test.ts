import { beforeEach, describe, expect, it } from 'vitest'
import type { Db } from '@/db/client'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { verifyAuditLog } from '@/lib/server/verify-audit'
import { openTestDatabase } from '../helpers/database'

let db: Db
const ctx = (): Ctx => ({ actor: { kind: 'system' }, now: 1_772_550_000_000, requestId: 'r', db, idempotencyKey: null })

/** As somebody with the file in hand could do it: triggers dropped first. */
function tamper(sql: string): void {
  db.$client.exec(`drop trigger audit_log_no_update; drop trigger audit_log_no_delete; ${sql}`)
}

beforeEach(() => {
  db = openTestDatabase()
  for (let number = 1; number <= 5; number += 1) {
    db.transaction((tx) =>
      writeAudit(tx, ctx(), {
        action: 'settings.record',
        unitId: 'u',
        subject: { kind: 'settings', id: `s${number}` },
        before: number === 1 ? undefined : { peepCmH2O: 5, note: null, left: undefined },
        after: { peepCmH2O: number, 'ünit “text”': [1.5, -0, 1e-7, { deep: true }] },
      }),
    )
  }
})

describe('the audit log', () => {
  it('is whole as it was written, and when it is empty', () => {
    expect(verifyAuditLog(db)).toEqual({ isWhole: true, rows: 5 })
    expect(verifyAuditLog(openTestDatabase())).toEqual({ isWhole: true, rows: 0 })
  })

  it('is whole over more rows than one page', () => {
    db.transaction((tx) => {
      for (let number = 0; number < 2_100; number += 1) writeAudit(tx, ctx(), { action: 'access.denied' })
    })
    expect(verifyAuditLog(db)).toEqual({ isWhole: true, rows: 2_105 })
  })

  it.each([
    ['a changed value', `update audit_log set after = '{"peepCmH2O":4}' where seq = 3`, 3, 'changed'],
    ['a changed time', `update audit_log set at = at + 1 where seq = 3`, 3, 'changed'],
    ['a changed actor', `update audit_log set actor_id = 'other' where seq = 3`, 3, 'changed'],
    ['a changed hash', `update audit_log set hash = 'x' where seq = 3`, 3, 'changed'],
    ['a removed row', `delete from audit_log where seq = 3`, 3, 'missing'],
    ['a removed first row', `delete from audit_log where seq = 1`, 1, 'missing'],
    [
      'a removed row with the rest moved up',
      `delete from audit_log where seq = 3; update audit_log set seq = seq - 1 where seq > 3`,
      3,
      'out_of_chain',
    ],
  ])('shows %s', (_what, sql, atSeq, fault) => {
    tamper(sql)
    expect(verifyAuditLog(db)).toEqual({ isWhole: false, atSeq, fault })
  })
})
