import { AppError, invalidField } from '@/lib/shared/errors'
import { formatTime } from '@/lib/shared/format'

/** A hold or trial in time (UTC ms); a running one has no end. */
export type Interval = { entryId: string; startMs: number; endMs: number | null; recordedByName: string }

/**
 * Only one hold, and only one trial, of an episode at a time. Refuses a second one while one runs, and a time span that reaches into
 * another one's. `what` reads like "a sedation hold".
 */
export function refuseOverlap(
  own: { entryId: string; startMs: number; endMs: number | null },
  intervals: Interval[],
  words: { what: string; timeZone: string; now: number },
): void {
  const time = (ms: number) => formatTime(ms, words.timeZone, words.now)
  for (const other of intervals) {
    if (other.entryId === own.entryId) continue
    if (other.endMs === null && own.endMs === null) {
      const text = `${words.what} has been running since ${time(other.startMs)} (${other.recordedByName}). Record its end first. Nothing was recorded.`
      throw new AppError('PRECONDITION', text.charAt(0).toUpperCase() + text.slice(1))
    }
    const startsBeforeOwnEnd = own.endMs === null || other.startMs < own.endMs
    const endsAfterOwnStart = other.endMs === null || other.endMs > own.startMs
    if (!startsBeforeOwnEnd || !endsAfterOwnStart) continue
    const until = other.endMs === null ? 'now' : time(other.endMs)
    throw invalidField(
      'observed.time',
      `Another one stands from ${time(other.startMs)} to ${until}; two cannot overlap. Give another time.`,
    )
  }
}
