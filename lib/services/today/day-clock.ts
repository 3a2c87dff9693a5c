import { localDay, shiftDay } from '@/lib/shared/time'
import type { DayClock } from '@/lib/weaning/day-record'
import type { ProtocolContent } from '@/lib/weaning/protocol'
import { rememberedMoment } from './remembered-time'

/** Where a moment (UTC ms) stands in the unit's calendar day and screening window, through every clock change. */
export function makeDayClock(now: number, timeZone: string, window: ProtocolContent['screeningWindow']): DayClock {
  const day = localDay(now, timeZone)
  return {
    nowMs: now,
    day,
    previousDay: shiftDay(day, -1),
    windowOpensMs: rememberedMoment(day, window.opensMin, timeZone),
    windowClosesMs: rememberedMoment(day, window.closesMin, timeZone),
    dayEndsMs: rememberedMoment(shiftDay(day, 1), 0, timeZone),
  }
}
