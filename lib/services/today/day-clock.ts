import { localDay, shiftDay, wallClockMs } from '@/lib/shared/time'
import type { DayClock } from '@/lib/weaning/day-record'
import type { ProtocolContent } from '@/lib/weaning/protocol'

/** Where a moment (UTC ms) stands in the unit's calendar day and screening window, through every clock change. */
export function makeDayClock(now: number, timeZone: string, window: ProtocolContent['screeningWindow']): DayClock {
  const day = localDay(now, timeZone)
  return {
    nowMs: now,
    day,
    previousDay: shiftDay(day, -1),
    windowOpensMs: wallClockMs(day, window.opensMin, timeZone),
    windowClosesMs: wallClockMs(day, window.closesMin, timeZone),
    dayEndsMs: wallClockMs(shiftDay(day, 1), 0, timeZone),
  }
}
