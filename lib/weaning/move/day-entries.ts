import type { DayDecision, DayHold, DayRecord, DayScreen, DayTrial } from '@/lib/weaning/day-record'
import { latest } from './latest'

/** An ended trial with its end. */
export type EndedTrial = DayTrial & { endedMs: number; outcome: NonNullable<DayTrial['outcome']> }
/** What counts of one ventilator day: the latest screen and hold, the latest ended trial, and the decision that answers what was before it. */
export type DayEntries = {
  screen: DayScreen | null
  hold: DayHold | null
  trial: EndedTrial | null
  decision: DayDecision | null
}

/**
 * What counts of one ventilator day. A decision counts only when it was signed after the day's latest trial had ended: what was signed
 * before does not answer that trial.
 */
export function dayEntries(record: DayRecord, day: string): DayEntries {
  const ofDay = <T extends { ventilatorDay: string }>(entries: T[]) =>
    entries.filter(({ ventilatorDay }) => ventilatorDay === day)
  const trial = latest(ofDay(record.trials).flatMap(toEnded), ({ endedMs }) => endedMs)
  const decision = latest(ofDay(record.decisions), ({ signedMs }) => signedMs)
  return {
    screen: latest(ofDay(record.screens), ({ observedMs }) => observedMs),
    hold: latest(ofDay(record.holds), ({ startedMs }) => startedMs),
    trial,
    decision: decision !== null && (trial === null || decision.signedMs >= trial.endedMs) ? decision : null,
  }
}

/** Whether anything at all was recorded on that ventilator day. */
export function isDayEmpty(record: DayRecord, day: string): boolean {
  return [...record.screens, ...record.holds, ...record.trials, ...record.decisions].every(
    ({ ventilatorDay }) => ventilatorDay !== day,
  )
}

function toEnded(trial: DayTrial): EndedTrial[] {
  const { outcome } = trial
  return outcome === null ? [] : [{ ...trial, outcome, endedMs: trial.endedMs ?? trial.startedMs }]
}
