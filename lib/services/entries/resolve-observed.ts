import { invalidField } from '@/lib/shared/errors'
import { formatDay, formatTime } from '@/lib/shared/format'
import { MINUTE_MS, wallClockMoments } from '@/lib/shared/time'
import type { ObservedInput } from '@/lib/schemas/observed'

/**
 * The moment that a wall-clock entry means in the unit's zone, UTC milliseconds.
 * Refuses, at the field: a day that does not exist, an hour that daylight saving skipped, a doubled hour without saying which, a time in the future.
 */
export function resolveObserved(observed: ObservedInput, timeZone: string, now: number, field = 'observed'): number {
  const [hours = 0, minutes = 0] = observed.time.split(':').map(Number)
  const asDate = new Date(`${observed.day}T00:00:00Z`)
  if (Number.isNaN(asDate.getTime()) || asDate.toISOString().slice(0, 10) !== observed.day) {
    throw invalidField(`${field}.day`, 'This day does not exist. Give it as year-month-day, such as 2026-12-01.')
  }
  const moments = wallClockMoments(observed.day, hours * 60 + minutes, timeZone)
  const [first, second] = moments
  if (first === undefined) {
    throw invalidField(
      `${field}.time`,
      `The clocks went forward on ${formatDay(observed.day)}: ${observed.time} did not exist. Give the time after the change.`,
    )
  }
  if (second !== undefined && observed.fold === undefined) {
    throw invalidField(
      `${field}.fold`,
      `The clocks went back on ${formatDay(observed.day)}: ${observed.time} came twice. Say whether it was the first or the second.`,
    )
  }
  const at = second !== undefined && observed.fold === 'second' ? second : first
  if (at > now + MINUTE_MS) {
    throw invalidField(`${field}.time`, `This time is in the future. It is ${formatTime(now, timeZone, now)} now.`)
  }
  return at
}
