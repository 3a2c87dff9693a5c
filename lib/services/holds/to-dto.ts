import type { NamedHold, NamedHoldEnd, NamedHoldObservation } from '@/db/queries/holds'
import type { HoldDto, HoldEndDto, HoldObservationDto, RunningHoldDto } from '@/lib/schemas/holds'
import { MINUTE_MS } from '@/lib/shared/time'
import { isTolerated } from '@/lib/weaning/hold/is-tolerated'
import type { ProtocolContent } from '@/lib/weaning/protocol'
import { toEntryDto } from '../entries/to-entry-dto'
import { judgeRules, nameRules } from '../steps/judged-rules'
import { computeRestarts } from './restarts'

export function toHoldObservationDto({ row, recordedByName, protocolNumber }: NamedHoldObservation): HoldObservationDto {
  return { ...toEntryDto(row, recordedByName, protocolNumber), readings: row.readings, opensEyesToVoice: row.opensEyesToVoice }
}

export function toHoldEndDto({ row, recordedByName, protocolNumber }: NamedHoldEnd, protocol: ProtocolContent): HoldEndDto {
  return {
    ...toEntryDto(row, recordedByName, protocolNumber),
    outcome: row.outcome,
    rulesMet: nameRules(protocol.hold.failRules, row.rulesMet),
    restarts: row.restarts,
    note: row.note,
  }
}

type Parts = { hold: NamedHold; observations: NamedHoldObservation[]; end: NamedHoldEnd | undefined; protocol: ProtocolContent }

/** A hold with its observations and its fail rules, judged by the protocol version that it began under. */
export function toHoldDto({ hold, observations, end, protocol }: Parts, now: number): HoldDto {
  const { row, recordedByName, protocolNumber } = hold
  const until = end?.row.observedAt ?? Math.max(now, observations.at(-1)?.row.observedAt ?? now)
  return {
    ...toEntryDto(row, recordedByName, protocolNumber),
    start: row.start,
    safety: row.safety,
    infusions: row.infusions,
    note: row.note,
    observations: observations.map(toHoldObservationDto),
    end: end ? toHoldEndDto(end, protocol) : null,
    rules: row.start === 'started' ? judgeRules(protocol.hold.failRules, null, observations, until) : [],
  }
}

/** A running hold with what its page counts towards. */
export function toRunningHoldDto(parts: Parts, now: number): RunningHoldDto {
  const { hold, observations, protocol } = parts
  const dto = toHoldDto(parts, now)
  const startedMs = hold.row.observedAt
  const { observeEveryMin, toleratedAfterMin, restartFraction } = protocol.hold
  const lastLookMs = observations.at(-1)?.row.observedAt ?? startedMs
  const eyesOpenedAtMs = observations.find(({ row }) => row.opensEyesToVoice === 'yes')?.row.observedAt ?? null
  const failRulesMet = dto.rules.filter(({ state }) => state === 'met').map(({ id }) => id)
  return {
    ...dto,
    nextObservationDueMs: lastLookMs + observeEveryMin * MINUTE_MS,
    toleratedByTimeAtMs: startedMs + toleratedAfterMin * MINUTE_MS,
    eyesOpenedAtMs,
    isTolerated: isTolerated({
      startedMs,
      atMs: now,
      opensEyesToVoice: eyesOpenedAtMs !== null,
      failRulesMet,
      toleratedAfterMin,
    }),
    restartFraction,
    restartsIfNotTolerated: computeRestarts(hold.row.infusions, restartFraction),
  }
}
