import type { DayClock, DayHold, DayRecord, DayTrial, NextMove, NoMoveReason } from './day-record'
import { carriedMove, promisedLook } from './move/carried-move'
import { isDayEmpty } from './move/day-entries'
import { holdMove } from './move/hold-move'
import { latest } from './move/latest'
import { noMove } from './move/owed'
import { todayMove } from './move/today-move'
import { trialMove } from './move/trial-move'
import type { ProtocolContent } from './protocol'

type Input = { protocol: ProtocolContent; record: DayRecord; clock: DayClock }

/**
 * The one next move of a ventilated patient: step, role, since when, due when, overdue or not, and why; or the stated reason why there is
 * none. Always exactly one answer, from the protocol in force, what has been recorded and the clock, and nothing else.
 * Variant: what is running comes first, then what was recorded today, then what yesterday left open. Source: the unit's protocol.
 * @example nextMove({ protocol: defaultProtocol, record, clock }) // { kind: 'move', step: 'screen', role: 'rt', … }
 */
export function nextMove({ protocol, record, clock }: Input): NextMove {
  const outside = outsideReason(record)
  if (outside !== null) return noMove(outside)
  const trial = latest(record.trials.filter(isRunningTrial), ({ startedMs }) => startedMs)
  const hold = latest(record.holds.filter(isRunningHold), ({ startedMs }) => startedMs)
  if (trial !== null && (trial.stopRulesMet.length > 0 || hold === null || hold.failRulesMet.length === 0)) {
    return trialMove(trial, protocol, clock)
  }
  const move = dayMove({ protocol, record, clock })
  return hold === null || isMoreUrgent(move, hold) ? move : holdMove(hold, protocol, clock)
}

function outsideReason(record: DayRecord): NoMoveReason | null {
  if (record.episodeEndedMs !== null) return { code: 'episode_ended', end: record.episodeEnd, atMs: record.episodeEndedMs }
  if (record.isAdult === null) return { code: 'age_unknown' }
  return record.isAdult ? null : { code: 'not_adult' }
}

const isRunningTrial = ({ endedMs, outcome }: DayTrial) => endedMs === null && outcome === null
const isRunningHold = ({ start, endedMs, outcome }: DayHold) => start === 'started' && endedMs === null && outcome === null

/** A hold that nobody ended must not hide the answer to a trial passed during it, or an extubation signed since, while the patient is calm. */
function isMoreUrgent(move: NextMove, hold: DayHold): boolean {
  if (move.kind === 'none' || hold.failRulesMet.length > 0) return false
  return (move.step === 'decide' || move.step === 'extubate') && move.sinceMs >= hold.startedMs
}

function dayMove({ protocol, record, clock }: Input): NextMove {
  if (clock.nowMs < clock.windowOpensMs && isDayEmpty(record, clock.day)) {
    return carriedMove(record, protocol, clock) ?? todayMove(record, protocol, clock)
  }
  const move = todayMove(record, protocol, clock)
  if (move.kind === 'move' || !ENDED_BEFORE_TRIAL.has(move.reason.code)) return move
  return promisedLook(record, protocol, clock) ?? move
}

/** Reasons for which a day ends before a trial; a look that an earlier day promised for today still stands then. */
const ENDED_BEFORE_TRIAL = new Set<NoMoveReason['code']>(['not_ready', 'hold_unsafe', 'hold_not_tolerated', 'hold_stopped'])
