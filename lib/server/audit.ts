import 'server-only'
import { createHash } from 'node:crypto'
import type { Tx } from '@/db/client'
import { insertAuditRow, findLastAuditHash } from '@/db/queries/audit'
import type { Ctx } from './ctx'

export type AuditFact = {
  /** thing.verb, past or present: 'screen.record', 'access.denied'. */
  action: string
  unitId?: string | null
  subject?: { kind: string; id: string }
  before?: unknown
  after?: unknown
}

/** Hash of one audit row over its content and the row before it. */
export function hashAuditRow(previousHash: string, row: Record<string, unknown>): string {
  return createHash('sha256').update(previousHash).update(JSON.stringify(row)).digest('hex')
}

/** Adds the audit row of a change, in the transaction of that change: if it fails, all fails. */
export function writeAudit(tx: Tx, ctx: Ctx, fact: AuditFact): void {
  const actor = ctx.actor
  const row = {
    at: ctx.now,
    actorKind: actor.kind,
    actorId: actor.kind === 'person' ? actor.personId : actor.kind === 'job' ? actor.name : null,
    action: fact.action,
    unitId: fact.unitId ?? null,
    subjectKind: fact.subject?.kind ?? null,
    subjectId: fact.subject?.id ?? null,
    requestId: ctx.requestId,
    before: fact.before ?? null,
    after: fact.after ?? null,
  }
  const previousHash = findLastAuditHash(tx)
  insertAuditRow(tx, { ...row, previousHash, hash: hashAuditRow(previousHash, row) })
}
