import 'server-only'
import { and, desc, eq, notExists } from 'drizzle-orm'
import { alias } from 'drizzle-orm/sqlite-core'
import type { Tx } from '../client'
import { settings } from '../schema'

const newer = alias(settings, 'newer')

/** One version, and whether a newer one supersedes it. */
export function findSettingsVersion(tx: Tx, id: string) {
  const row = tx.select().from(settings).where(eq(settings.id, id)).get()
  if (!row) return undefined
  const isSuperseded = tx.select({ id: settings.id }).from(settings).where(eq(settings.supersedesId, id)).get() !== undefined
  return { row, isSuperseded }
}

/** The settings last observed in an episode, in their current version. */
export function findLatestSettings(tx: Tx, episodeId: string) {
  return tx
    .select()
    .from(settings)
    .where(
      and(
        eq(settings.episodeId, episodeId),
        eq(settings.isWithdrawn, false),
        notExists(tx.select({ id: newer.id }).from(newer).where(eq(newer.supersedesId, settings.id))),
      ),
    )
    .orderBy(desc(settings.observedAt), desc(settings.recordedAt))
    .limit(1)
    .get()
}

export function insertSettings(tx: Tx, row: typeof settings.$inferInsert) {
  return tx.insert(settings).values(row).returning().get()
}
