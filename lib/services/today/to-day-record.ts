import type { DayEntries } from '@/db/queries/day-entries'
import { groupBy } from '@/lib/shared/group-by'
import type { DayDecision, DayHold, DayRecord, DayScreen, DayTrial } from '@/lib/weaning/day-record'
import type { ProtocolContent } from '@/lib/weaning/protocol'
import type { ObservedReadings } from '@/lib/weaning/readings'
import type { ScreenVerdict } from '@/lib/weaning/screen/verdict'
import { judgeStop } from '@/lib/weaning/stop/judge-stop'
import type { Observation } from '@/lib/weaning/stop/observation'
import { rulesMet } from '@/lib/weaning/stop/rules-met'
import type { CriterionMark, EpisodeEnd, ScreenCriterion } from '@/lib/weaning/vocabulary'

/** Gives the content of a protocol version by its id. */
export type FindProtocol = (protocolVersionId: string) => ProtocolContent

type EpisodePart = { id: string; startedAt: number; endedAt: number | null; end: EpisodeEnd | null }
export type GroupedEntries = { [Table in keyof DayEntries]: Map<string, DayEntries[Table][number][]> }

/** The entries by episode, observations and ends by the hold or trial that they belong to. */
export function groupDayEntries(entries: DayEntries): GroupedEntries {
  return {
    screens: groupBy(entries.screens, (row) => row.episodeId),
    holds: groupBy(entries.holds, (row) => row.episodeId),
    holdObservations: groupBy(entries.holdObservations, (row) => row.holdId),
    holdEnds: groupBy(entries.holdEnds, (row) => row.holdId),
    trials: groupBy(entries.trials, (row) => row.episodeId),
    trialObservations: groupBy(entries.trialObservations, (row) => row.trialId),
    trialEnds: groupBy(entries.trialEnds, (row) => row.trialId),
    decisions: groupBy(entries.decisions, (row) => row.episodeId),
  }
}

/**
 * One episode's record as the core takes it. A running hold or trial is judged by the protocol version that it began under, up to
 * `nowMs`; an ended one keeps the rules that were recorded with its end.
 */
export function toDayRecord(
  episode: EpisodePart,
  isAdult: boolean | null,
  grouped: GroupedEntries,
  findProtocol: FindProtocol,
  nowMs: number,
): DayRecord {
  return {
    episodeStartedMs: episode.startedAt,
    episodeEndedMs: episode.endedAt,
    episodeEnd: episode.end,
    isAdult,
    screens: byTime(grouped.screens.get(episode.id)).map(toDayScreen),
    holds: byTime(grouped.holds.get(episode.id)).map((row) => toDayHold(row, grouped, findProtocol, nowMs)),
    trials: byTime(grouped.trials.get(episode.id)).map((row) => toDayTrial(row, grouped, findProtocol, nowMs)),
    decisions: byTime(grouped.decisions.get(episode.id)).map(toDayDecision),
  }
}

function byTime<Row extends { observedAt: number; recordedAt: number }>(rows: Row[] = []): Row[] {
  return [...rows].sort((a, b) => a.observedAt - b.observedAt || a.recordedAt - b.recordedAt)
}

function toDayScreen(row: DayEntries['screens'][number]): DayScreen {
  // A ready screen has every criterion met, an excused one has no verdict: nothing to look up.
  const hasMarks = row.verdictJson !== null && (row.result === 'not_ready' || row.result === 'incomplete')
  const criteria = hasMarks ? (JSON.parse(row.verdictJson ?? '') as ScreenVerdict).criteria : []
  const marked = (mark: CriterionMark): ScreenCriterion[] =>
    criteria.filter((criterion) => criterion.mark === mark).map(({ criterion }) => criterion)
  return {
    ventilatorDay: row.ventilatorDay,
    observedMs: row.observedAt,
    result: row.result,
    excuse: row.excuse,
    notMet: marked('not_met'),
    notAssessed: marked('not_assessed'),
  }
}

/** What our own schema wrote, read back. */
function parseReadings(json: string): ObservedReadings {
  return JSON.parse(json) as ObservedReadings
}

function toLooks(observations: { observedAt: number; readingsJson: string | null }[]): Observation[] {
  return observations.flatMap(({ observedAt, readingsJson }) =>
    readingsJson === null ? [] : [{ atMs: observedAt, readings: parseReadings(readingsJson) }],
  )
}

function toDayHold(
  row: DayEntries['holds'][number],
  grouped: GroupedEntries,
  findProtocol: FindProtocol,
  nowMs: number,
): DayHold {
  const observations = grouped.holdObservations.get(row.entryId) ?? []
  const end = grouped.holdEnds.get(row.entryId)?.[0]
  const met =
    end || row.start !== 'started'
      ? { ids: end?.rulesMet ?? [], firstMetMs: null }
      : rulesMet(judgeStop(findProtocol(row.protocolVersionId).hold.failRules, null, toLooks(observations), nowMs))
  return {
    ventilatorDay: row.ventilatorDay,
    start: row.start,
    startedMs: row.observedAt,
    unsafeBecause: presentItems(row.safety),
    lastObservedMs: observations.at(-1)?.observedAt ?? null,
    failRulesMet: met.ids,
    failRulesMetMs: met.firstMetMs,
    opensEyesMs: observations.find((look) => look.opensEyesToVoice === 'yes')?.observedAt ?? null,
    endedMs: end?.observedAt ?? null,
    outcome: end?.outcome ?? null,
  }
}

function presentItems(safety: DayEntries['holds'][number]['safety']): DayHold['unsafeBecause'] {
  const items = Object.keys(safety ?? {}) as DayHold['unsafeBecause']
  return items.filter((item) => safety?.[item] === true)
}

function toDayTrial(
  row: DayEntries['trials'][number],
  grouped: GroupedEntries,
  findProtocol: FindProtocol,
  nowMs: number,
): DayTrial {
  const observations = grouped.trialObservations.get(row.entryId) ?? []
  const end = grouped.trialEnds.get(row.entryId)?.[0]
  const met = end
    ? { ids: end.rulesMet, firstMetMs: null }
    : rulesMet(
        judgeStop(
          findProtocol(row.protocolVersionId).trial.stopRules,
          parseReadings(row.baselineJson),
          toLooks(observations),
          nowMs,
        ),
      )
  return {
    ventilatorDay: row.ventilatorDay,
    startedMs: row.observedAt,
    plannedDurationMin: row.plannedDurationMin,
    observedMs: observations.map((look) => look.observedAt),
    stopRulesMet: met.ids,
    stopRulesMetMs: met.firstMetMs,
    endedMs: end?.observedAt ?? null,
    outcome: end?.outcome ?? null,
  }
}

function toDayDecision(row: DayEntries['decisions'][number]): DayDecision {
  return { ventilatorDay: row.ventilatorDay, signedMs: row.observedAt, choice: row.choice, lookAgainMs: row.lookAgainAt }
}
