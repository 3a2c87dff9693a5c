import 'server-only'
import { and, desc, eq, sql } from 'drizzle-orm'
import type { Tx } from '../client'
import { people, protocolVersions, screens } from '../schema'
import { isCurrent } from './current'

const named = { row: screens, recordedByName: people.name, protocolNumber: protocolVersions.number }

function selectNamed(tx: Tx) {
  return tx
    .select(named)
    .from(screens)
    .innerJoin(people, eq(people.id, screens.recordedBy))
    .innerJoin(protocolVersions, eq(protocolVersions.id, screens.protocolVersionId))
}
/** A screen's row with the name of its author and the number of the protocol version that judged it. */
export type NamedScreen = { row: typeof screens.$inferSelect; recordedByName: string; protocolNumber: number }

/** One version, and whether a newer one supersedes it. */
export function findScreenVersion(tx: Tx, id: string) {
  const row = tx.select().from(screens).where(eq(screens.id, id)).get()
  if (!row) return undefined
  const isSuperseded = tx.select({ id: screens.id }).from(screens).where(eq(screens.supersedesId, id)).get() !== undefined
  return { row, isSuperseded }
}

export function findNamedScreen(tx: Tx, id: string): NamedScreen | undefined {
  return selectNamed(tx).where(eq(screens.id, id)).get()
}

/** The screen recorded last in an episode, whatever moment it tells of. */
export function findNewestScreen(tx: Tx, episodeId: string): NamedScreen | undefined {
  return selectNamed(tx)
    .where(and(eq(screens.episodeId, episodeId), isCurrent(screens)))
    .orderBy(desc(screens.recordedAt), sql`${screens}.rowid desc`)
    .limit(1)
    .get()
}

/** Current screens of one ventilator day, latest observed first. */
export function listScreensOfDay(tx: Tx, episodeId: string, ventilatorDay: string): NamedScreen[] {
  return selectNamed(tx)
    .where(and(eq(screens.episodeId, episodeId), eq(screens.ventilatorDay, ventilatorDay), isCurrent(screens)))
    .orderBy(desc(screens.observedAt), desc(screens.recordedAt))
    .all()
}

export function insertScreen(tx: Tx, row: typeof screens.$inferInsert) {
  return tx.insert(screens).values(row).returning().get()
}
