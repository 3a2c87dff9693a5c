import type { DayTrackDto } from '@/lib/schemas/today'
import { MINUTE_MS } from '@/lib/shared/time'
import type { DayRecord } from '@/lib/weaning/day-record'

/** One calendar day of the record as the day track draws it: what belongs to that day, and what still runs from an earlier one. */
export function toDayTrack(record: DayRecord, day: string, pairingWindowMin: number): DayTrackDto {
  const isShown = (entry: { ventilatorDay: string; endedMs: number | null }) =>
    entry.ventilatorDay === day || entry.endedMs === null
  const holds = record.holds.filter((hold) => (hold.start === 'started' ? isShown(hold) : hold.ventilatorDay === day))
  const lastStarted = holds.filter((hold) => hold.start === 'started').at(-1)
  // After a hold that was not tolerated or was stopped there is no trial to meet it.
  const mayStillPair = lastStarted !== undefined && (lastStarted.outcome === null || lastStarted.outcome === 'tolerated')
  return {
    screens: record.screens
      .filter((screen) => screen.ventilatorDay === day)
      .map((screen) => ({ atMs: screen.observedMs, result: screen.result })),
    holds: holds.map((hold) => ({ startMs: hold.startedMs, endMs: hold.endedMs, start: hold.start, outcome: hold.outcome })),
    pairingWindow:
      lastStarted && mayStillPair
        ? { startMs: lastStarted.startedMs, endMs: lastStarted.startedMs + pairingWindowMin * MINUTE_MS }
        : null,
    trials: record.trials.filter(isShown).map((trial) => ({
      startMs: trial.startedMs,
      endMs: trial.endedMs,
      outcome: trial.outcome,
      observationsMs: trial.observedMs,
    })),
    decisions: record.decisions
      .filter((decision) => decision.ventilatorDay === day)
      .map((decision) => ({ atMs: decision.signedMs, choice: decision.choice })),
  }
}
