import 'server-only'
import { and, asc, desc, eq, inArray } from 'drizzle-orm'
import type { AirwayEvent } from '@/lib/weaning/vocabulary'
import type { Tx } from '../client'
import { airwayEvents } from '../schema'
import { isCurrent } from './current'

/** One version, and whether a newer one supersedes it. */
export function findAirwayEventVersion(tx: Tx, id: string) {
  const row = tx.select().from(airwayEvents).where(eq(airwayEvents.id, id)).get()
  if (!row) return undefined
  const isSuperseded =
    tx.select({ id: airwayEvents.id }).from(airwayEvents).where(eq(airwayEvents.supersedesId, id)).get() !== undefined
  return { row, isSuperseded }
}

/** The current event of one of the given kinds in an episode: the first or the last one observed. */
export function findAirwayEvent(tx: Tx, episodeId: string, kinds: readonly AirwayEvent[], which: 'first' | 'last') {
  return tx
    .select()
    .from(airwayEvents)
    .where(and(eq(airwayEvents.episodeId, episodeId), inArray(airwayEvents.event, [...kinds]), isCurrent(airwayEvents)))
    .orderBy(which === 'first' ? asc(airwayEvents.observedAt) : desc(airwayEvents.observedAt))
    .limit(1)
    .get()
}

export function insertAirwayEvent(tx: Tx, row: typeof airwayEvents.$inferInsert) {
  return tx.insert(airwayEvents).values(row).returning().get()
}
