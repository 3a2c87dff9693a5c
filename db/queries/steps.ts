import 'server-only'
import { and, desc, eq } from 'drizzle-orm'
import type { Tx } from '../client'
import { beds, gases, people } from '../schema'
import { isCurrent } from './current'

export function findBedLabel(tx: Tx, bedId: string): string | undefined {
  return tx.select({ label: beds.label }).from(beds).where(eq(beds.id, bedId)).get()?.label
}

/** The blood gas last observed in an episode, in its current version. */
export function findLatestGasOfEpisode(tx: Tx, episodeId: string) {
  return tx
    .select()
    .from(gases)
    .where(and(eq(gases.episodeId, episodeId), isCurrent(gases)))
    .orderBy(desc(gases.observedAt), desc(gases.recordedAt))
    .limit(1)
    .get()
}

export function findPersonName(tx: Tx, personId: string): string | undefined {
  return tx.select({ name: people.name }).from(people).where(eq(people.id, personId)).get()?.name
}
