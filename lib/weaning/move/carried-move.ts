import type { DayClock, DayRecord, NextMove } from '@/lib/weaning/day-record'
import type { ProtocolContent } from '@/lib/weaning/protocol'
import { afterTrial } from './after-trial'
import { dayEntries } from './day-entries'
import { decisionMove } from './decision-move'
import { latest } from './latest'

/** What yesterday left open until today's window opens: a passed trial without an answer, a signed extubation, a time to look again. */
export function carriedMove(record: DayRecord, protocol: ProtocolContent, clock: DayClock): NextMove | null {
  const { trial, decision } = dayEntries(record, clock.previousDay)
  if (decision !== null) return decision.choice === 'tracheostomy_pathway' ? null : decisionMove(decision, protocol, clock)
  return trial?.outcome === 'passed' ? afterTrial(trial, protocol, clock) : null
}

/**
 * A time to look again that an earlier day set for today, for a day whose own steps came to an end before a trial.
 * null when there is none, or something was tried or decided since.
 */
export function promisedLook(record: DayRecord, protocol: ProtocolContent, clock: DayClock): NextMove | null {
  const decision = latest(record.decisions, ({ signedMs }) => signedMs)
  if (decision === null || decision.choice !== 'not_today' || decision.ventilatorDay === clock.day) return null
  const isForToday =
    decision.lookAgainMs !== null && decision.lookAgainMs >= clock.windowOpensMs && decision.lookAgainMs < clock.dayEndsMs
  const isTriedSince = record.trials.some(({ startedMs }) => startedMs > decision.signedMs)
  return isForToday && !isTriedSince ? decisionMove(decision, protocol, clock) : null
}
