import { TZDate } from '@date-fns/tz'
import { addDays, format } from 'date-fns'

export const MINUTE_MS = 60_000
export const HOUR_MS = 3_600_000

/** Calendar day (yyyy-mm-dd) of a moment in a time zone. */
export function localDay(ms: number, timeZone: string): string {
  return format(new TZDate(ms, timeZone), 'yyyy-MM-dd')
}

/** The day before or after (yyyy-mm-dd), by calendar. */
export function shiftDay(day: string, days: number): string {
  const [year = 0, month = 1, date = 1] = day.split('-').map(Number)
  return format(addDays(new Date(year, month - 1, date, 12), days), 'yyyy-MM-dd')
}

/**
 * The moments at which a wall clock in the zone shows this day and these minutes after midnight, earliest first: one as a rule,
 * none when daylight saving skips that time, two when it doubles it.
 */
export function wallClockMoments(day: string, minutesAfterMidnight: number, timeZone: string): number[] {
  const [year = 0, month = 1, date = 1] = day.split('-').map(Number)
  const asUtc = Date.UTC(year, month - 1, date, 0, minutesAfterMidnight)
  const offsets = [asUtc - 24 * HOUR_MS, asUtc + 24 * HOUR_MS].map(
    (ms) => new TZDate(ms, timeZone).getTimezoneOffset() * MINUTE_MS,
  )
  const moments = [...new Set(offsets)].map((offset) => asUtc + offset)
  return moments.filter((ms) => new TZDate(ms, timeZone).getTimezoneOffset() * MINUTE_MS === ms - asUtc).sort((a, b) => a - b)
}

/** The one moment for a scheduled wall-clock time: the first of a doubled one; a skipped one moves forward by the hour that was skipped. */
export function wallClockMs(day: string, minutesAfterMidnight: number, timeZone: string): number {
  const [first] = wallClockMoments(day, minutesAfterMidnight, timeZone)
  if (first !== undefined) return first
  const [year = 0, month = 1, date = 1] = day.split('-').map(Number)
  const asUtc = Date.UTC(year, month - 1, date, 0, minutesAfterMidnight)
  return asUtc + new TZDate(asUtc - 24 * HOUR_MS, timeZone).getTimezoneOffset() * MINUTE_MS
}

/** Whole years between a birth date (yyyy-mm-dd) and a local day (yyyy-mm-dd); null when the birth date is unknown. */
export function ageYears(birthDate: string | null, day: string): number | null {
  if (birthDate === null) return null
  const years = Number(day.slice(0, 4)) - Number(birthDate.slice(0, 4))
  return day.slice(5) < birthDate.slice(5) ? years - 1 : years
}
