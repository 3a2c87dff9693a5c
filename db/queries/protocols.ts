import 'server-only'
import { and, desc, eq, isNotNull, isNull, lte, max, or, sql } from 'drizzle-orm'
import { alias } from 'drizzle-orm/sqlite-core'
import type { Tx } from '../client'
import { auditLog, people, protocolVersions } from '../schema'
import { preparedOnce } from './prepared'

const inForceStatements = preparedOnce((tx) => ({
  started: tx
    .select()
    .from(protocolVersions)
    .where(
      and(
        eq(protocolVersions.unitId, sql.placeholder('unitId')),
        lte(protocolVersions.startsAt, sql.placeholder('at')),
        or(isNotNull(protocolVersions.approvedAt), eq(protocolVersions.isDefault, true)),
      ),
    )
    .orderBy(desc(protocolVersions.startsAt), desc(protocolVersions.number))
    .limit(1)
    .prepare(),
  first: tx
    .select()
    .from(protocolVersions)
    .where(and(eq(protocolVersions.unitId, sql.placeholder('unitId')), eq(protocolVersions.isDefault, true)))
    .orderBy(sql`${protocolVersions.number}`)
    .limit(1)
    .prepare(),
}))

/** The unit's protocol version in force at a moment: approved or default, latest start, higher number on a tie; else the unit's first one. */
export function findProtocolInForce(tx: Tx, unitId: string, at: number) {
  const { started, first } = inForceStatements(tx)
  return started.get({ unitId, at }) ?? first.get({ unitId })
}

/** One version, whatever its state. */
export function findProtocolVersion(tx: Tx, id: string) {
  return tx.select().from(protocolVersions).where(eq(protocolVersions.id, id)).get()
}

const drafters = alias(people, 'drafters')
const approvers = alias(people, 'approvers')

/** All versions of a unit with the names of who drafted and approved them, newest number first. */
export function listProtocolVersions(tx: Tx, unitId: string) {
  return tx
    .select({ row: protocolVersions, draftedByName: drafters.name, approvedByName: approvers.name })
    .from(protocolVersions)
    .leftJoin(drafters, eq(drafters.id, protocolVersions.draftedBy))
    .leftJoin(approvers, eq(approvers.id, protocolVersions.approvedBy))
    .where(eq(protocolVersions.unitId, unitId))
    .orderBy(desc(protocolVersions.number))
    .all()
}

/** The unit's draft: neither approved nor the product's default. */
export function findDraft(tx: Tx, unitId: string) {
  return tx
    .select()
    .from(protocolVersions)
    .where(and(eq(protocolVersions.unitId, unitId), isNull(protocolVersions.approvedAt), eq(protocolVersions.isDefault, false)))
    .orderBy(desc(protocolVersions.number))
    .limit(1)
    .get()
}

export function findHighestProtocolNumber(tx: Tx, unitId: string): number {
  const found = tx
    .select({ highest: max(protocolVersions.number) })
    .from(protocolVersions)
    .where(eq(protocolVersions.unitId, unitId))
    .get()
  return found?.highest ?? 0
}

/** Whether a person ever saved this version as a draft, by the audit log. */
export function hasDrafted(tx: Tx, versionId: string, personId: string): boolean {
  const found = tx
    .select({ seq: auditLog.seq })
    .from(auditLog)
    .where(and(eq(auditLog.subjectId, versionId), eq(auditLog.action, 'protocol.draft'), eq(auditLog.actorId, personId)))
    .limit(1)
    .get()
  return found !== undefined
}

export function insertProtocolVersion(tx: Tx, row: typeof protocolVersions.$inferInsert) {
  return tx.insert(protocolVersions).values(row).returning().get()
}

/** Changes a draft that still has the given version number; undefined when somebody else changed it first. */
export function updateDraft(
  tx: Tx,
  draft: { id: string; version: number },
  values: Partial<Omit<typeof protocolVersions.$inferInsert, 'id' | 'unitId' | 'number' | 'version'>>,
) {
  return tx
    .update(protocolVersions)
    .set({ ...values, version: draft.version + 1 })
    .where(
      and(eq(protocolVersions.id, draft.id), eq(protocolVersions.version, draft.version), isNull(protocolVersions.approvedAt)),
    )
    .returning()
    .get()
}
