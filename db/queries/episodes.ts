import 'server-only'
import { and, asc, desc, eq, isNull, sql } from 'drizzle-orm'
import type { Tx } from '../client'
import {
  airwayEvents,
  decisions,
  episodes,
  gases,
  holdEnds,
  holdObservations,
  holds,
  screens,
  settings,
  trialEnds,
  trialObservations,
  trials,
} from '../schema'
import { isCurrent } from './current'

export function findOpenEpisode(tx: Tx, patientId: string) {
  return tx
    .select()
    .from(episodes)
    .where(and(eq(episodes.patientId, patientId), isNull(episodes.endedAt)))
    .limit(1)
    .get()
}

/** All episodes of a patient, earliest first. */
export function listEpisodesOfPatient(tx: Tx, patientId: string) {
  return tx.select().from(episodes).where(eq(episodes.patientId, patientId)).orderBy(asc(episodes.startedAt)).all()
}

export function insertEpisode(tx: Tx, row: typeof episodes.$inferInsert) {
  return tx.insert(episodes).values(row).returning().get()
}

/** Changes an episode at a known version. Undefined when somebody else changed it meanwhile. */
export function updateEpisode(tx: Tx, episode: { id: string; version: number }, change: Partial<typeof episodes.$inferInsert>) {
  return tx
    .update(episodes)
    .set({ ...change, version: episode.version + 1 })
    .where(and(eq(episodes.id, episode.id), eq(episodes.version, episode.version)))
    .returning()
    .get()
}

/** The decision signed last in an episode, in its current version. */
export function findLatestDecision(tx: Tx, episodeId: string) {
  return tx
    .select({
      ventilatorDay: decisions.ventilatorDay,
      observedAt: decisions.observedAt,
      recordedAt: decisions.recordedAt,
      recordedBy: decisions.recordedBy,
      choice: decisions.choice,
    })
    .from(decisions)
    .where(and(eq(decisions.episodeId, episodeId), isCurrent(decisions)))
    .orderBy(desc(decisions.observedAt), desc(decisions.recordedAt))
    .limit(1)
    .get()
}

const OBSERVED_TABLES = [
  settings,
  gases,
  screens,
  holds,
  holdObservations,
  holdEnds,
  trials,
  trialObservations,
  trialEnds,
] as const

/**
 * First and last moment that a current entry of the episode was observed at (UTC ms). Begin and end of ventilation are left out, and
 * decisions, which may be signed after the fact; a tracheostomy counts. Null without entries.
 */
export function findObservedSpan(tx: Tx, episodeId: string): { firstMs: number; lastMs: number } | null {
  const spans = OBSERVED_TABLES.map((table) =>
    tx
      .select({ first: sql<number | null>`min(${table.observedAt})`, last: sql<number | null>`max(${table.observedAt})` })
      .from(table)
      .where(and(eq(table.episodeId, episodeId), isCurrent(table)))
      .get(),
  )
  const placed = tx
    .select({ at: airwayEvents.observedAt })
    .from(airwayEvents)
    .where(and(eq(airwayEvents.episodeId, episodeId), eq(airwayEvents.event, 'tracheostomy_placed'), isCurrent(airwayEvents)))
    .all()
  const moments = [...spans.flatMap((span) => [span?.first ?? null, span?.last ?? null]), ...placed.map((row) => row.at)].filter(
    (at) => at !== null,
  )
  return moments.length === 0 ? null : { firstMs: Math.min(...moments), lastMs: Math.max(...moments) }
}
