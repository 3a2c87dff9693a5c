import { localDay, MINUTE_MS, shiftDay, wallClockMs } from '@/lib/shared/time'

const DAY_MS = 24 * 60 * MINUTE_MS

/** The days of the demo in the hospital's zone, the last of them today. Day indices count from the first day of history. */
export type Calendar = {
  days: readonly string[]
  todayIndex: number
  dayAfterToday: string
  /** Moment of a day at minutes after its midnight. Days before the first count as the first; days to come are plain ones of 24 hours. */
  at: (dayIndex: number, minutes: number) => number
  indexOf: (ms: number) => number
  dayOf: (ms: number) => string
  isWeekend: (dayIndex: number) => boolean
}

export function makeCalendar(nowMs: number, timeZone: string, historyDays: number): Calendar {
  const today = localDay(nowMs, timeZone)
  const days = Array.from({ length: historyDays + 1 }, (_, index) => shiftDay(today, index - historyDays))
  const starts = days.map((day) => wallClockMs(day, 0, timeZone))
  const indexOf = (ms: number): number => {
    let index = Math.max(0, Math.min(historyDays, Math.floor((ms - (starts[0] ?? 0)) / DAY_MS)))
    while (index > 0 && (starts[index] ?? 0) > ms) index -= 1
    while (index < historyDays && (starts[index + 1] ?? Infinity) <= ms) index += 1
    return index
  }
  return {
    days,
    todayIndex: historyDays,
    dayAfterToday: shiftDay(today, 1),
    at: (dayIndex, minutes) => {
      const known = Math.max(0, Math.min(historyDays, dayIndex))
      return (starts[known] ?? 0) + Math.max(0, dayIndex - known) * DAY_MS + Math.round(minutes) * MINUTE_MS
    },
    indexOf,
    dayOf: (ms) => days[indexOf(ms)] ?? today,
    isWeekend: (dayIndex) => [0, 6].includes(new Date(`${days[dayIndex] ?? today}T12:00:00Z`).getUTCDay()),
  }
}

/**
 * A zone of whole hours in which it is between 08:30 and 09:29 now, so that the demo always opens in the morning of the ventilator day.
 * The names of these zones count westwards: Etc/GMT+7 is seven hours behind Greenwich.
 */
export function demoTimeZone(nowMs: number): string {
  const now = new Date(nowMs)
  const targetHour = now.getUTCMinutes() < 30 ? 9 : 8
  const ahead = targetHour - now.getUTCHours()
  const hours = ahead < -12 ? ahead + 24 : ahead
  return hours === 0 ? 'Etc/GMT' : `Etc/GMT${hours > 0 ? '-' : '+'}${Math.abs(hours)}`
}
