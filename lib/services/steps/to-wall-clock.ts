import { TZDate } from '@date-fns/tz'
import { format } from 'date-fns'
import type { ObservedInput } from '@/lib/schemas/observed'
import { localDay, MINUTE_MS, wallClockMoments } from '@/lib/shared/time'

/** What the unit's wall clock shows at a moment (UTC ms), as a form takes it; says which of the two in the hour that is doubled. */
export function toWallClock(ms: number, timeZone: string): ObservedInput {
  const at = new TZDate(ms, timeZone)
  const day = localDay(ms, timeZone)
  const [first, second] = wallClockMoments(day, at.getHours() * 60 + at.getMinutes(), timeZone)
  const clock = { day, time: format(at, 'HH:mm') }
  if (first === undefined || second === undefined) return clock
  return { ...clock, fold: ms - second >= 0 && ms - second < MINUTE_MS ? 'second' : 'first' }
}
