import 'server-only'
import { asc, eq, inArray } from 'drizzle-orm'
import type { Tx } from '../client'
import {
  airwayEvents,
  decisions,
  gases,
  holdEnds,
  holdObservations,
  holds,
  people,
  protocolVersions,
  screens,
  settings,
  trialEnds,
  trialObservations,
  trials,
} from '../schema'

/** Every version of every entry of an episode, superseded and withdrawn ones too, first versions first. */
export function listAllVersions(tx: Tx, episodeId: string) {
  return {
    settings: tx.select().from(settings).where(eq(settings.episodeId, episodeId)).orderBy(asc(settings.entryVersion)).all(),
    gas: tx.select().from(gases).where(eq(gases.episodeId, episodeId)).orderBy(asc(gases.entryVersion)).all(),
    airway: tx
      .select()
      .from(airwayEvents)
      .where(eq(airwayEvents.episodeId, episodeId))
      .orderBy(asc(airwayEvents.entryVersion))
      .all(),
    screen: tx.select().from(screens).where(eq(screens.episodeId, episodeId)).orderBy(asc(screens.entryVersion)).all(),
    hold: tx.select().from(holds).where(eq(holds.episodeId, episodeId)).orderBy(asc(holds.entryVersion)).all(),
    holdObservation: tx
      .select()
      .from(holdObservations)
      .where(eq(holdObservations.episodeId, episodeId))
      .orderBy(asc(holdObservations.entryVersion))
      .all(),
    holdEnd: tx.select().from(holdEnds).where(eq(holdEnds.episodeId, episodeId)).orderBy(asc(holdEnds.entryVersion)).all(),
    trial: tx.select().from(trials).where(eq(trials.episodeId, episodeId)).orderBy(asc(trials.entryVersion)).all(),
    trialObservation: tx
      .select()
      .from(trialObservations)
      .where(eq(trialObservations.episodeId, episodeId))
      .orderBy(asc(trialObservations.entryVersion))
      .all(),
    trialEnd: tx.select().from(trialEnds).where(eq(trialEnds.episodeId, episodeId)).orderBy(asc(trialEnds.entryVersion)).all(),
    decision: tx.select().from(decisions).where(eq(decisions.episodeId, episodeId)).orderBy(asc(decisions.entryVersion)).all(),
  }
}
export type AllVersions = ReturnType<typeof listAllVersions>

export function listPersonNames(tx: Tx, ids: readonly string[]): Map<string, string> {
  const rows = tx
    .select({ id: people.id, name: people.name })
    .from(people)
    .where(inArray(people.id, [...ids]))
    .all()
  return new Map(rows.map((row) => [row.id, row.name]))
}

export function listProtocolNumbers(tx: Tx, ids: readonly string[]): Map<string, number> {
  const rows = tx
    .select({ id: protocolVersions.id, number: protocolVersions.number })
    .from(protocolVersions)
    .where(inArray(protocolVersions.id, [...ids]))
    .all()
  return new Map(rows.map((row) => [row.id, row.number]))
}

/** The contents of protocol versions by id, for naming the rules that an old entry met. */
export function listProtocolContents(tx: Tx, ids: readonly string[]) {
  const rows = tx
    .select({ id: protocolVersions.id, content: protocolVersions.content })
    .from(protocolVersions)
    .where(inArray(protocolVersions.id, [...ids]))
    .all()
  return new Map(rows.map((row) => [row.id, row.content]))
}
