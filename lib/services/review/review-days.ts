import { wallClockMs } from '@/lib/shared/time'
import type { ReviewDay } from '@/lib/weaning/course/monthly-measures'

type ScreeningWindow = { startsAt: number | null; closesMin: number }

/** Midnights never change once computed; kept because asking the time-zone data for 700 of them takes longer than all the counting. */
const midnights = new Map<string, number>()
const MOST_KEPT = 20_000

function midnightMs(day: string, timeZone: string): number {
  const key = `${timeZone} ${day}`
  const known = midnights.get(key)
  if (known !== undefined) return known
  if (midnights.size >= MOST_KEPT) midnights.clear()
  const ms = wallClockMs(day, 0, timeZone)
  midnights.set(key, ms)
  return ms
}

/**
 * The calendar days from firstDay to lastDay (yyyy-mm-dd, both included) in a zone, each with its bounds and the moment at which the
 * screening window closed under the protocol in force as the day began. Windows come oldest start first.
 */
export function reviewDays(
  firstDay: string,
  lastDay: string,
  timeZone: string,
  windows: readonly ScreeningWindow[],
): ReviewDay[] {
  const days: ReviewDay[] = []
  let startMs = midnightMs(firstDay, timeZone)
  for (let day = firstDay; day <= lastDay;) {
    const next = dayAfter(day)
    const endMs = midnightMs(next, timeZone)
    days.push({ day, startMs, endMs, closesMs: closesMs(day, startMs, endMs, timeZone, windows) })
    day = next
    startMs = endMs
  }
  return days
}

/** By plain calendar arithmetic: 700 days through the general formatter took longer than reading the record. */
function dayAfter(day: string): string {
  return new Date(Date.parse(`${day}T00:00:00Z`) + PLAIN_DAY_MS).toISOString().slice(0, 10)
}

const PLAIN_DAY_MS = 24 * 3_600_000

function closesMs(day: string, startMs: number, endMs: number, timeZone: string, windows: readonly ScreeningWindow[]): number {
  const inForce = windows.findLast(({ startsAt }) => startsAt !== null && startsAt <= startMs) ?? windows[0]
  if (!inForce) return endMs
  return endMs - startMs === PLAIN_DAY_MS ? startMs + inForce.closesMin * 60_000 : wallClockMs(day, inForce.closesMin, timeZone)
}
