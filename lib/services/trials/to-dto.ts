import type { NamedTrial, NamedTrialEnd, NamedTrialObservation } from '@/db/queries/trials'
import type { RunningTrialDto, TrialDto, TrialEndDto, TrialObservationDto } from '@/lib/schemas/trials'
import { MINUTE_MS } from '@/lib/shared/time'
import { breathingIndex } from '@/lib/weaning/indices/breathing-index'
import type { ProtocolContent } from '@/lib/weaning/protocol'
import type { ObservedReadings } from '@/lib/weaning/readings'
import { nextObservation } from '@/lib/weaning/stop/next-observation'
import { toEntryDto } from '../entries/to-entry-dto'
import { judgeRules, nameRules } from '../steps/judged-rules'

/** RSBI of one look; null when rate or volume is missing or the patient is not known to be an adult. */
function rsbiOf({ breathsPerMin, tidalVolumeMl }: ObservedReadings, isAdult: boolean | null): number | null {
  const index = breathingIndex({ breathsPerMin, tidalVolumeMl, isAdult })
  return index.known ? index.value : null
}

export function toTrialObservationDto(
  { row, recordedByName, protocolNumber }: NamedTrialObservation,
  startMs: number,
  isAdult: boolean | null,
): TrialObservationDto {
  const minute = Math.round((row.observedAt - startMs) / MINUTE_MS)
  return {
    ...toEntryDto(row, recordedByName, protocolNumber),
    readings: row.readings,
    minute,
    rsbi: rsbiOf(row.readings, isAdult),
  }
}

export function toTrialEndDto({ row, recordedByName, protocolNumber }: NamedTrialEnd, protocol: ProtocolContent): TrialEndDto {
  return {
    ...toEntryDto(row, recordedByName, protocolNumber),
    outcome: row.outcome,
    rulesMet: nameRules(protocol.trial.stopRules, row.rulesMet),
    returnedTo: row.returnedTo,
    reason: row.reason,
  }
}

type Parts = {
  trial: NamedTrial
  observations: NamedTrialObservation[]
  end: NamedTrialEnd | undefined
  protocol: ProtocolContent
}

/** A trial with its observations and its stop rules, judged by the protocol version that it began under. */
export function toTrialDto({ trial, observations, end, protocol }: Parts, now: number, isAdult: boolean | null): TrialDto {
  const { row, recordedByName, protocolNumber } = trial
  const until = end?.row.observedAt ?? Math.max(now, observations.at(-1)?.row.observedAt ?? now)
  return {
    ...toEntryDto(row, recordedByName, protocolNumber),
    technique: row.technique,
    pressureSupportCmH2O: row.pressureSupportCmH2O,
    peepCmH2O: row.peepCmH2O,
    fio2Fraction: row.fio2Fraction,
    plannedDurationMin: row.plannedDurationMin,
    baseline: row.baseline,
    baselineRsbi: rsbiOf(row.baseline, isAdult),
    startedAnywayBecause: row.startedAnywayBecause,
    observations: observations.map((look) => toTrialObservationDto(look, row.observedAt, isAdult)),
    end: end ? toTrialEndDto(end, protocol) : null,
    rules: judgeRules(protocol.trial.stopRules, row.baseline, observations, until),
  }
}

/** A running trial with its planned end and the look that is due next. */
export function toRunningTrialDto(parts: Parts, now: number, isAdult: boolean | null): RunningTrialDto {
  const { trial, observations, protocol } = parts
  const { observedAt: startedMs, plannedDurationMin } = trial.row
  return {
    ...toTrialDto(parts, now, isAdult),
    plannedEndMs: startedMs + plannedDurationMin * MINUTE_MS,
    nextObservation: nextObservation({
      startedMs,
      plannedDurationMin,
      observationMinutes: protocol.trial.observationMinutes,
      observedMs: observations.map(({ row }) => row.observedAt),
    }),
  }
}
