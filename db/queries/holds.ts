import 'server-only'
import { and, asc, desc, eq, inArray, sql } from 'drizzle-orm'
import type { Tx } from '../client'
import { holdEnds, holdObservations, holds, people, protocolVersions } from '../schema'
import { isCurrent } from './current'

// holdId is the entryId of a hold, which all its versions share; observations and ends point to it.
type Named<Row> = { row: Row; recordedByName: string; protocolNumber: number }
export type NamedHold = Named<typeof holds.$inferSelect>
export type NamedHoldObservation = Named<typeof holdObservations.$inferSelect>
export type NamedHoldEnd = Named<typeof holdEnds.$inferSelect>

function selectNamed(tx: Tx) {
  return tx
    .select({ row: holds, recordedByName: people.name, protocolNumber: protocolVersions.number })
    .from(holds)
    .innerJoin(people, eq(people.id, holds.recordedBy))
    .innerJoin(protocolVersions, eq(protocolVersions.id, holds.protocolVersionId))
}

/** One version, and whether a newer one supersedes it. */
export function findHoldVersion(tx: Tx, id: string) {
  const row = tx.select().from(holds).where(eq(holds.id, id)).get()
  if (!row) return undefined
  const isSuperseded = tx.select({ id: holds.id }).from(holds).where(eq(holds.supersedesId, id)).get() !== undefined
  return { row, isSuperseded }
}

export function findHoldObservationVersion(tx: Tx, id: string) {
  const row = tx.select().from(holdObservations).where(eq(holdObservations.id, id)).get()
  if (!row) return undefined
  const newer = tx.select({ id: holdObservations.id }).from(holdObservations).where(eq(holdObservations.supersedesId, id)).get()
  return { row, isSuperseded: newer !== undefined }
}

export function findHoldEndVersion(tx: Tx, id: string) {
  const row = tx.select().from(holdEnds).where(eq(holdEnds.id, id)).get()
  if (!row) return undefined
  const isSuperseded = tx.select({ id: holdEnds.id }).from(holdEnds).where(eq(holdEnds.supersedesId, id)).get() !== undefined
  return { row, isSuperseded }
}

/** The current version of a hold, by the id that its versions share. */
export function findHold(tx: Tx, entryId: string): NamedHold | undefined {
  return selectNamed(tx)
    .where(and(eq(holds.entryId, entryId), isCurrent(holds)))
    .get()
}

/** The hold recorded last in an episode, whatever moment it tells of. */
export function findNewestHold(tx: Tx, episodeId: string): NamedHold | undefined {
  return selectNamed(tx)
    .where(and(eq(holds.episodeId, episodeId), isCurrent(holds)))
    .orderBy(desc(holds.recordedAt), sql`${holds}.rowid desc`)
    .limit(1)
    .get()
}

/** Every current hold of an episode, latest start first. */
export function listHolds(tx: Tx, episodeId: string): NamedHold[] {
  return selectNamed(tx)
    .where(and(eq(holds.episodeId, episodeId), isCurrent(holds)))
    .orderBy(desc(holds.observedAt), desc(holds.recordedAt))
    .all()
}

/** Current observations of the given holds, by time observed. */
export function listHoldObservations(tx: Tx, entryIds: string[]): NamedHoldObservation[] {
  return tx
    .select({ row: holdObservations, recordedByName: people.name, protocolNumber: protocolVersions.number })
    .from(holdObservations)
    .innerJoin(people, eq(people.id, holdObservations.recordedBy))
    .innerJoin(protocolVersions, eq(protocolVersions.id, holdObservations.protocolVersionId))
    .where(and(inArray(holdObservations.holdId, entryIds), isCurrent(holdObservations)))
    .orderBy(asc(holdObservations.observedAt), asc(holdObservations.recordedAt))
    .all()
}

/** Current ends of the given holds. */
export function listHoldEnds(tx: Tx, entryIds: string[]): NamedHoldEnd[] {
  return tx
    .select({ row: holdEnds, recordedByName: people.name, protocolNumber: protocolVersions.number })
    .from(holdEnds)
    .innerJoin(people, eq(people.id, holdEnds.recordedBy))
    .innerJoin(protocolVersions, eq(protocolVersions.id, holdEnds.protocolVersionId))
    .where(and(inArray(holdEnds.holdId, entryIds), isCurrent(holdEnds)))
    .all()
}

export function insertHold(tx: Tx, row: typeof holds.$inferInsert) {
  return tx.insert(holds).values(row).returning().get()
}

export function insertHoldObservation(tx: Tx, row: typeof holdObservations.$inferInsert) {
  return tx.insert(holdObservations).values(row).returning().get()
}

export function insertHoldEnd(tx: Tx, row: typeof holdEnds.$inferInsert) {
  return tx.insert(holdEnds).values(row).returning().get()
}
