import { invalidField } from '@/lib/shared/errors'
import { formatTime } from '@/lib/shared/format'
import { MINUTE_MS } from '@/lib/shared/time'

/** Forms give whole minutes, so an entry of the same minute is not before. */
const isBefore = (ms: number, otherMs: number) => ms <= otherMs - MINUTE_MS

/** Refuses an observation before its hold or trial started or after it ended. Times in UTC ms; `what` reads like "hold". */
export function refuseOutsideStep(
  observedAt: number,
  step: { startMs: number; endMs: number | null },
  words: { what: string; timeZone: string; now: number },
): void {
  const time = (ms: number) => formatTime(ms, words.timeZone, words.now)
  if (isBefore(observedAt, step.startMs)) {
    throw invalidField('observed.time', `The ${words.what} started at ${time(step.startMs)}. Give a later time.`)
  }
  if (step.endMs !== null && observedAt > step.endMs) {
    throw invalidField('observed.time', `The ${words.what} ended at ${time(step.endMs)}. Give an earlier time.`)
  }
}

/** Refuses an end before the start or before the last look. */
export function refuseEndTooEarly(
  endMs: number,
  step: { startMs: number; lastLookMs: number | null },
  words: { what: string; timeZone: string; now: number },
): void {
  const time = (ms: number) => formatTime(ms, words.timeZone, words.now)
  if (isBefore(endMs, step.startMs)) {
    throw invalidField('observed.time', `The ${words.what} started at ${time(step.startMs)}. It ended no earlier than that.`)
  }
  if (step.lastLookMs !== null && isBefore(endMs, step.lastLookMs)) {
    throw invalidField(
      'observed.time',
      `An observation stands at ${time(step.lastLookMs)}. The ${words.what} ended no earlier than that.`,
    )
  }
}
