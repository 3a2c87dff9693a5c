import 'server-only'
import { and, asc, desc, eq, inArray, sql } from 'drizzle-orm'
import type { Tx } from '../client'
import { trialEnds, trialObservations, trials, people, protocolVersions } from '../schema'
import { isCurrent } from './current'

// trialId is the entryId of a trial, which all its versions share; observations and ends point to it.
type Named<Row> = { row: Row; recordedByName: string; protocolNumber: number }
export type NamedTrial = Named<typeof trials.$inferSelect>
export type NamedTrialObservation = Named<typeof trialObservations.$inferSelect>
export type NamedTrialEnd = Named<typeof trialEnds.$inferSelect>

function selectNamed(tx: Tx) {
  return tx
    .select({ row: trials, recordedByName: people.name, protocolNumber: protocolVersions.number })
    .from(trials)
    .innerJoin(people, eq(people.id, trials.recordedBy))
    .innerJoin(protocolVersions, eq(protocolVersions.id, trials.protocolVersionId))
}

/** One version, and whether a newer one supersedes it. */
export function findTrialVersion(tx: Tx, id: string) {
  const row = tx.select().from(trials).where(eq(trials.id, id)).get()
  if (!row) return undefined
  const isSuperseded = tx.select({ id: trials.id }).from(trials).where(eq(trials.supersedesId, id)).get() !== undefined
  return { row, isSuperseded }
}

export function findTrialObservationVersion(tx: Tx, id: string) {
  const row = tx.select().from(trialObservations).where(eq(trialObservations.id, id)).get()
  if (!row) return undefined
  const newer = tx
    .select({ id: trialObservations.id })
    .from(trialObservations)
    .where(eq(trialObservations.supersedesId, id))
    .get()
  return { row, isSuperseded: newer !== undefined }
}

export function findTrialEndVersion(tx: Tx, id: string) {
  const row = tx.select().from(trialEnds).where(eq(trialEnds.id, id)).get()
  if (!row) return undefined
  const isSuperseded = tx.select({ id: trialEnds.id }).from(trialEnds).where(eq(trialEnds.supersedesId, id)).get() !== undefined
  return { row, isSuperseded }
}

/** The current version of a trial, by the id that its versions share. */
export function findTrial(tx: Tx, entryId: string): NamedTrial | undefined {
  return selectNamed(tx)
    .where(and(eq(trials.entryId, entryId), isCurrent(trials)))
    .get()
}

/** The trial recorded last in an episode, whatever moment it tells of. */
export function findNewestTrial(tx: Tx, episodeId: string): NamedTrial | undefined {
  return selectNamed(tx)
    .where(and(eq(trials.episodeId, episodeId), isCurrent(trials)))
    .orderBy(desc(trials.recordedAt), sql`${trials}.rowid desc`)
    .limit(1)
    .get()
}

/** Every current trial of an episode, latest start first. */
export function listTrials(tx: Tx, episodeId: string): NamedTrial[] {
  return selectNamed(tx)
    .where(and(eq(trials.episodeId, episodeId), isCurrent(trials)))
    .orderBy(desc(trials.observedAt), desc(trials.recordedAt))
    .all()
}

/** Current observations of the given trials, by time observed. */
export function listTrialObservations(tx: Tx, entryIds: string[]): NamedTrialObservation[] {
  return tx
    .select({ row: trialObservations, recordedByName: people.name, protocolNumber: protocolVersions.number })
    .from(trialObservations)
    .innerJoin(people, eq(people.id, trialObservations.recordedBy))
    .innerJoin(protocolVersions, eq(protocolVersions.id, trialObservations.protocolVersionId))
    .where(and(inArray(trialObservations.trialId, entryIds), isCurrent(trialObservations)))
    .orderBy(asc(trialObservations.observedAt), asc(trialObservations.recordedAt))
    .all()
}

/** Current ends of the given trials. */
export function listTrialEnds(tx: Tx, entryIds: string[]): NamedTrialEnd[] {
  return tx
    .select({ row: trialEnds, recordedByName: people.name, protocolNumber: protocolVersions.number })
    .from(trialEnds)
    .innerJoin(people, eq(people.id, trialEnds.recordedBy))
    .innerJoin(protocolVersions, eq(protocolVersions.id, trialEnds.protocolVersionId))
    .where(and(inArray(trialEnds.trialId, entryIds), isCurrent(trialEnds)))
    .all()
}

export function insertTrial(tx: Tx, row: typeof trials.$inferInsert) {
  return tx.insert(trials).values(row).returning().get()
}

export function insertTrialObservation(tx: Tx, row: typeof trialObservations.$inferInsert) {
  return tx.insert(trialObservations).values(row).returning().get()
}

export function insertTrialEnd(tx: Tx, row: typeof trialEnds.$inferInsert) {
  return tx.insert(trialEnds).values(row).returning().get()
}
