import type { DayClock, DayDecision, DayRecord, NextMove } from '@/lib/weaning/day-record'
import type { ProtocolContent } from '@/lib/weaning/protocol'
import { afterScreen } from './after-screen'
import { afterTrial } from './after-trial'
import { dayEntries, type DayEntries } from './day-entries'
import { decisionMove } from './decision-move'
import { screenMove } from './screen-move'

/**
 * The move by what was recorded today, when neither a hold nor a trial is running. The last word counts: a decision after the trial,
 * the trial after the screen, and a screen again when it was made later than a trial that was not passed.
 */
export function todayMove(record: DayRecord, protocol: ProtocolContent, clock: DayClock): NextMove {
  const today = dayEntries(record, clock.day)
  const { screen, hold, trial, decision } = today
  if (decision !== null && isStanding(decision, today, clock)) return decisionMove(decision, protocol, clock)
  const isTrialLast = trial !== null && (trial.outcome === 'passed' || screen === null || screen.observedMs <= trial.endedMs)
  if (decision === null && isTrialLast) return afterTrial(trial, protocol, clock)
  return screen === null ? screenMove(record, clock) : afterScreen(screen, hold, { protocol, clock })
}

/**
 * A signed extubation stands whatever is screened later. "Not today" and the tracheostomy pathway give way to a later screen that is ready,
 * and do not replace a screen that is still owed.
 */
function isStanding(decision: DayDecision, { screen, trial }: DayEntries, clock: DayClock): boolean {
  if (decision.choice === 'extubate' || decision.choice === 'comfort_extubation') return true
  if (screen === null) return trial !== null || clock.nowMs < clock.windowOpensMs
  return screen.result !== 'ready' || screen.observedMs <= decision.signedMs
}
