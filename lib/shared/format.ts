import { TZDate } from '@date-fns/tz'
import { format } from 'date-fns'
import { localDay } from './time'

/** 24-hour clock in the unit's zone, with the date when it is not the day of `nowMs`: "09:40", "30 Nov 09:40", with year "30 Nov 2025 09:40". */
export function formatTime(ms: number, timeZone: string, nowMs: number): string {
  const at = new TZDate(ms, timeZone)
  if (localDay(ms, timeZone) === localDay(nowMs, timeZone)) return format(at, 'HH:mm')
  return format(at, at.getFullYear() === new TZDate(nowMs, timeZone).getFullYear() ? 'd MMM HH:mm' : 'd MMM yyyy HH:mm')
}

/** "1 Dec 2026" for a calendar day yyyy-mm-dd. */
export function formatDay(day: string): string {
  const [year = 0, month = 1, date = 1] = day.split('-').map(Number)
  return format(new Date(year, month - 1, date), 'd MMM yyyy')
}

/** "2 h 10 min", "35 min", "3 d 4 h". Negative durations are shown by their size. */
export function formatDuration(ms: number): string {
  const minutes = Math.floor(Math.abs(ms) / 60_000)
  if (minutes < 60) return `${minutes} min`
  const hours = Math.floor(minutes / 60)
  if (hours < 48) return minutes % 60 === 0 ? `${hours} h` : `${hours} h ${minutes % 60} min`
  return `${Math.floor(hours / 24)} d ${hours % 24} h`
}

/** A number with a fixed count of decimals, for display only; comparisons use the unrounded value. */
export function formatNumber(value: number, decimals: number): string {
  return value.toFixed(decimals).replace('-', '\u2212')
}

/** Minutes after midnight as "05:00". */
export function formatMinutes(minutesAfterMidnight: number): string {
  const hours = Math.floor(minutesAfterMidnight / 60)
  return `${String(hours).padStart(2, '0')}:${String(minutesAfterMidnight % 60).padStart(2, '0')}`
}

/** "Dec 2026" for a month yyyy-mm. */
export function formatMonth(month: string): string {
  return formatDay(`${month}-01`).slice(2)
}
