import 'server-only'
import { and, gte, or, sql, type SQL } from 'drizzle-orm'
import type { SQLiteColumn } from 'drizzle-orm/sqlite-core'
import type { Tx } from '../client'
import { decisions, holdEnds, holdObservations, holds, screens, trialEnds, trialObservations, trials } from '../schema'
import { isCurrent, isOneOf } from './current'
import { preparedOnce } from './prepared'

const ids = sql`${sql.placeholder('ids')}`
const fromDay = sql.placeholder('fromDay')

/** A JSON column as its text. Most of these are never looked into: only what is running is judged, so only that is parsed. */
const asText = (column: SQLiteColumn) => sql<string>`${column}`

/** No end stands for it: none was recorded, or the one that was has been withdrawn. */
function hasNoEnd(ends: typeof holdEnds | typeof trialEnds, ofColumn: 'hold_id' | 'trial_id', entryId: SQLiteColumn): SQL {
  return sql`not exists (select 1 from ${ends} done where done.${sql.identifier(ofColumn)} = ${entryId} and done.is_withdrawn = 0
    and not exists (select 1 from ${ends} newer where newer.supersedes_id = done.id))`
}

function prepareStatements(tx: Tx) {
  const isOpenHold = sql`(${holds.start} = 'started' and ${hasNoEnd(holdEnds, 'hold_id', holds.entryId)})`
  // An earlier decision whose time to look again is still to come or of today, unless something was decided or tried since.
  const isPromise = sql`(${decisions.lookAgainAt} >= ${sql.placeholder('lookFrom')}
    and not exists (select 1 from ${decisions} later where later.episode_id = ${decisions.episodeId} and later.is_withdrawn = 0
      and later.observed_at > ${decisions.observedAt} and not exists (select 1 from ${decisions} newer where newer.supersedes_id = later.id))
    and not exists (select 1 from ${trials} since where since.episode_id = ${decisions.episodeId} and since.is_withdrawn = 0
      and since.observed_at > ${decisions.observedAt} and not exists (select 1 from ${trials} newer where newer.supersedes_id = since.id)))`
  const isOpenTrial = hasNoEnd(trialEnds, 'trial_id', trials.entryId)
  return {
    screens: tx.select({
      episodeId: screens.episodeId, ventilatorDay: screens.ventilatorDay, observedAt: screens.observedAt, recordedAt: screens.recordedAt,
      result: screens.result, excuse: screens.excuse, verdictJson: sql<string | null>`${screens.verdict}`,
    }).from(screens).where(and(isOneOf(screens.episodeId, ids), gte(screens.ventilatorDay, fromDay), isCurrent(screens))).prepare(),
    holds: tx.select({
      episodeId: holds.episodeId, entryId: holds.entryId, ventilatorDay: holds.ventilatorDay, observedAt: holds.observedAt, recordedAt: holds.recordedAt,
      start: holds.start, safety: holds.safety, protocolVersionId: holds.protocolVersionId,
    }).from(holds)
      .where(and(isOneOf(holds.episodeId, ids), or(gte(holds.ventilatorDay, fromDay), isOpenHold), isCurrent(holds))).prepare(),
    holdObservations: tx.select({
      holdId: holdObservations.holdId, observedAt: holdObservations.observedAt, readingsJson: asText(holdObservations.readings),
      opensEyesToVoice: holdObservations.opensEyesToVoice,
    }).from(holdObservations).where(and(isOneOf(holdObservations.holdId, ids), isCurrent(holdObservations)))
      .orderBy(holdObservations.observedAt).prepare(),
    holdEnds: tx.select({ holdId: holdEnds.holdId, observedAt: holdEnds.observedAt, outcome: holdEnds.outcome, rulesMet: holdEnds.rulesMet })
      .from(holdEnds).where(and(isOneOf(holdEnds.holdId, ids), isCurrent(holdEnds))).prepare(),
    trials: tx.select({
      episodeId: trials.episodeId, entryId: trials.entryId, ventilatorDay: trials.ventilatorDay, observedAt: trials.observedAt,
      recordedAt: trials.recordedAt, plannedDurationMin: trials.plannedDurationMin, baselineJson: asText(trials.baseline), protocolVersionId: trials.protocolVersionId,
    }).from(trials)
      .where(and(isOneOf(trials.episodeId, ids), or(gte(trials.ventilatorDay, fromDay), isOpenTrial), isCurrent(trials))).prepare(),
    trialObservations: tx.select({
      trialId: trialObservations.trialId, observedAt: trialObservations.observedAt, readingsJson: asText(trialObservations.readings),
    }).from(trialObservations).where(and(isOneOf(trialObservations.trialId, ids), isCurrent(trialObservations)))
      .orderBy(trialObservations.observedAt).prepare(),
    trialEnds: tx.select({ trialId: trialEnds.trialId, observedAt: trialEnds.observedAt, outcome: trialEnds.outcome, rulesMet: trialEnds.rulesMet })
      .from(trialEnds).where(and(isOneOf(trialEnds.trialId, ids), isCurrent(trialEnds))).prepare(),
    decisions: tx.select({
      episodeId: decisions.episodeId, ventilatorDay: decisions.ventilatorDay, observedAt: decisions.observedAt, recordedAt: decisions.recordedAt,
      choice: decisions.choice, lookAgainAt: decisions.lookAgainAt,
    }).from(decisions).where(and(isOneOf(decisions.episodeId, ids), or(gte(decisions.ventilatorDay, fromDay), isPromise), isCurrent(decisions))).prepare(),
  }
}

const statementsOf = preparedOnce(prepareStatements)

/**
 * What the flow of a day needs, of all given episodes at once: current entries since a calendar day (yyyy-mm-dd), holds and trials that still
 * run from whenever, and an earlier decision's time to look again from `lookFromMs` on. Eight statements, however many episodes.
 */
export function listDayEntries(tx: Tx, episodeIds: readonly string[], sinceDay: string, lookFromMs: number) {
  const statements = statementsOf(tx)
  const ofEpisodes = { ids: JSON.stringify(episodeIds), fromDay: sinceDay, lookFrom: lookFromMs }
  const holdRows = statements.holds.all(ofEpisodes)
  const trialRows = statements.trials.all(ofEpisodes)
  const ofHolds = { ids: JSON.stringify(holdRows.filter((hold) => hold.start === 'started').map((hold) => hold.entryId)) }
  const ofTrials = { ids: JSON.stringify(trialRows.map((trial) => trial.entryId)) }
  return {
    screens: statements.screens.all(ofEpisodes),
    holds: holdRows,
    holdObservations: statements.holdObservations.all(ofHolds),
    holdEnds: statements.holdEnds.all(ofHolds),
    trials: trialRows,
    trialObservations: statements.trialObservations.all(ofTrials),
    trialEnds: statements.trialEnds.all(ofTrials),
    decisions: statements.decisions.all(ofEpisodes),
  }
}
export type DayEntries = ReturnType<typeof listDayEntries>
