import 'server-only'
import { and, desc, eq, sql } from 'drizzle-orm'
import type { Tx } from '../client'
import { decisions, people, protocolVersions } from '../schema'
import { isCurrent } from './current'

/** A decision's row with the name of its signer and the number of the protocol version in force. */
export type NamedDecision = { row: typeof decisions.$inferSelect; recordedByName: string; protocolNumber: number }

function selectNamed(tx: Tx) {
  return tx
    .select({ row: decisions, recordedByName: people.name, protocolNumber: protocolVersions.number })
    .from(decisions)
    .innerJoin(people, eq(people.id, decisions.recordedBy))
    .innerJoin(protocolVersions, eq(protocolVersions.id, decisions.protocolVersionId))
}

/** One version, and whether a newer one supersedes it. */
export function findDecisionVersion(tx: Tx, id: string) {
  const row = tx.select().from(decisions).where(eq(decisions.id, id)).get()
  if (!row) return undefined
  const isSuperseded = tx.select({ id: decisions.id }).from(decisions).where(eq(decisions.supersedesId, id)).get() !== undefined
  return { row, isSuperseded }
}

export function findNamedDecision(tx: Tx, id: string): NamedDecision | undefined {
  return selectNamed(tx).where(eq(decisions.id, id)).get()
}

/** The decision signed last in an episode. */
export function findNewestDecision(tx: Tx, episodeId: string): NamedDecision | undefined {
  return selectNamed(tx)
    .where(and(eq(decisions.episodeId, episodeId), isCurrent(decisions)))
    .orderBy(desc(decisions.recordedAt), sql`${decisions}.rowid desc`)
    .limit(1)
    .get()
}

/** Current decisions of one ventilator day, latest first. */
export function listDecisionsOfDay(tx: Tx, episodeId: string, ventilatorDay: string): NamedDecision[] {
  return selectNamed(tx)
    .where(and(eq(decisions.episodeId, episodeId), eq(decisions.ventilatorDay, ventilatorDay), isCurrent(decisions)))
    .orderBy(desc(decisions.observedAt), sql`${decisions}.rowid desc`)
    .all()
}

export function insertDecision(tx: Tx, row: typeof decisions.$inferInsert) {
  return tx.insert(decisions).values(row).returning().get()
}
