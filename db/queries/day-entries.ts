import 'server-only'
import { and, gte, or, sql, type SQL } from 'drizzle-orm'
import type { SQLiteColumn } from 'drizzle-orm/sqlite-core'
import type { Tx } from '../client'
import { decisions, holdEnds, holdObservations, holds, screens, trialEnds, trialObservations, trials } from '../schema'
import { isCurrent, isOneOf } from './current'
import { preparedOnce } from './prepared'

const ids = sql`${sql.placeholder('ids')}`
const fromDay = sql.placeholder('fromDay')

/** A JSON column as its text, parsed only where it is looked into. */
const asText = (column: SQLiteColumn) => sql<string>`${column}`

/** The readings of what still runs: only that is judged. Null for the rest. */
const textIfRunning = (readings: SQLiteColumn, parentId: SQLiteColumn) =>
  sql<
    string | null
  >`case when ${parentId} in (select value from json_each(${sql.placeholder('runningIds')})) then ${readings} end`

/**
 * The hold or trial that started last in each given episode. Only it can still be running, from whatever day, because none starts while
 * another one runs. One step down the index for each episode.
 */
function isLastStarted(table: typeof holds | typeof trials, only: SQL = sql``): SQL {
  return sql`${table.id} in (
    select (select one.id from ${table} one where one.episode_id = given.value ${only} and one.is_withdrawn = 0
      and not exists (select 1 from ${table} newer where newer.supersedes_id = one.id)
      order by one.ventilator_day desc, one.observed_at desc limit 1)
    from json_each(${ids}) given)`
}

function prepareHolds(tx: Tx) {
  return {
    holds: tx
      .select({
        episodeId: holds.episodeId,
        entryId: holds.entryId,
        ventilatorDay: holds.ventilatorDay,
        observedAt: holds.observedAt,
        recordedAt: holds.recordedAt,
        start: holds.start,
        safety: holds.safety,
        protocolVersionId: holds.protocolVersionId,
      })
      .from(holds)
      .where(
        and(
          or(
            and(isOneOf(holds.episodeId, ids), gte(holds.ventilatorDay, fromDay)),
            isLastStarted(holds, sql`and one.start = 'started'`),
          ),
          isCurrent(holds),
        ),
      )
      .prepare(),
    holdObservations: tx
      .select({
        holdId: holdObservations.holdId,
        observedAt: holdObservations.observedAt,
        readingsJson: textIfRunning(holdObservations.readings, holdObservations.holdId),
        opensEyesToVoice: holdObservations.opensEyesToVoice,
      })
      .from(holdObservations)
      .where(and(isOneOf(holdObservations.holdId, ids), isCurrent(holdObservations)))
      .orderBy(holdObservations.observedAt)
      .prepare(),
    holdEnds: tx
      .select({
        holdId: holdEnds.holdId,
        observedAt: holdEnds.observedAt,
        outcome: holdEnds.outcome,
        rulesMet: holdEnds.rulesMet,
      })
      .from(holdEnds)
      .where(and(isOneOf(holdEnds.holdId, ids), isCurrent(holdEnds)))
      .prepare(),
  }
}

function prepareTrials(tx: Tx) {
  return {
    trials: tx
      .select({
        episodeId: trials.episodeId,
        entryId: trials.entryId,
        ventilatorDay: trials.ventilatorDay,
        observedAt: trials.observedAt,
        recordedAt: trials.recordedAt,
        plannedDurationMin: trials.plannedDurationMin,
        baselineJson: asText(trials.baseline),
        protocolVersionId: trials.protocolVersionId,
      })
      .from(trials)
      .where(
        and(
          or(and(isOneOf(trials.episodeId, ids), gte(trials.ventilatorDay, fromDay)), isLastStarted(trials)),
          isCurrent(trials),
        ),
      )
      .prepare(),
    trialObservations: tx
      .select({
        trialId: trialObservations.trialId,
        observedAt: trialObservations.observedAt,
        readingsJson: textIfRunning(trialObservations.readings, trialObservations.trialId),
      })
      .from(trialObservations)
      .where(and(isOneOf(trialObservations.trialId, ids), isCurrent(trialObservations)))
      .orderBy(trialObservations.observedAt)
      .prepare(),
    trialEnds: tx
      .select({
        trialId: trialEnds.trialId,
        observedAt: trialEnds.observedAt,
        outcome: trialEnds.outcome,
        rulesMet: trialEnds.rulesMet,
      })
      .from(trialEnds)
      .where(and(isOneOf(trialEnds.trialId, ids), isCurrent(trialEnds)))
      .prepare(),
  }
}

function prepareScreensAndDecisions(tx: Tx) {
  // An earlier decision whose time to look again is of today or still to come, unless something was decided since. Whether something was
  // tried since, the trial that started last tells.
  const isPromise = sql`(${decisions.lookAgainAt} >= ${sql.placeholder('lookFrom')}
    and not exists (select 1 from ${decisions} later where later.episode_id = ${decisions.episodeId} and later.is_withdrawn = 0
      and later.observed_at > ${decisions.observedAt} and not exists (select 1 from ${decisions} newer where newer.supersedes_id = later.id)))`
  return {
    screens: tx
      .select({
        episodeId: screens.episodeId,
        ventilatorDay: screens.ventilatorDay,
        observedAt: screens.observedAt,
        recordedAt: screens.recordedAt,
        result: screens.result,
        excuse: screens.excuse,
        verdictJson: sql<string | null>`${screens.verdict}`,
      })
      .from(screens)
      .where(and(isOneOf(screens.episodeId, ids), gte(screens.ventilatorDay, fromDay), isCurrent(screens)))
      .prepare(),
    decisions: tx
      .select({
        episodeId: decisions.episodeId,
        ventilatorDay: decisions.ventilatorDay,
        observedAt: decisions.observedAt,
        recordedAt: decisions.recordedAt,
        choice: decisions.choice,
        lookAgainAt: decisions.lookAgainAt,
      })
      .from(decisions)
      .where(and(isOneOf(decisions.episodeId, ids), or(gte(decisions.ventilatorDay, fromDay), isPromise), isCurrent(decisions)))
      .prepare(),
  }
}

const statementsOf = preparedOnce((tx) => ({ ...prepareScreensAndDecisions(tx), ...prepareHolds(tx), ...prepareTrials(tx) }))

/**
 * What the flow of a day needs, of all given episodes at once: current entries since a calendar day (yyyy-mm-dd), the hold and the trial started
 * last from whenever, and an earlier decision's time to look again from `lookFromMs` on. Eight statements, however many episodes.
 */
export function listDayEntries(tx: Tx, episodeIds: readonly string[], sinceDay: string, lookFromMs: number) {
  const statements = statementsOf(tx)
  const ofEpisodes = { ids: JSON.stringify(episodeIds), fromDay: sinceDay, lookFrom: lookFromMs }
  const holdRows = statements.holds.all(ofEpisodes)
  const trialRows = statements.trials.all(ofEpisodes)
  const holdIds = holdRows.filter((hold) => hold.start === 'started').map((hold) => hold.entryId)
  const trialIds = trialRows.map((trial) => trial.entryId)
  const holdEndRows = statements.holdEnds.all({ ids: JSON.stringify(holdIds) })
  const trialEndRows = statements.trialEnds.all({ ids: JSON.stringify(trialIds) })
  const endedHolds = new Set(holdEndRows.map((end) => end.holdId))
  const endedTrials = new Set(trialEndRows.map((end) => end.trialId))
  const looksOf = (entryIds: string[], ended: Set<string>) => ({
    ids: JSON.stringify(entryIds),
    runningIds: JSON.stringify(entryIds.filter((id) => !ended.has(id))),
  })
  return {
    screens: statements.screens.all(ofEpisodes),
    holds: holdRows,
    holdObservations: statements.holdObservations.all(looksOf(holdIds, endedHolds)),
    holdEnds: holdEndRows,
    trials: trialRows,
    trialObservations: statements.trialObservations.all(looksOf(trialIds, endedTrials)),
    trialEnds: trialEndRows,
    decisions: statements.decisions.all(ofEpisodes),
  }
}
export type DayEntries = ReturnType<typeof listDayEntries>
