import { localDay } from '@/lib/shared/time'

const LONGEST_MEMO = 5_000
const known = new Map<string, string>()

/** localDay, remembered: the moments on Today (begins and ends of ventilation) are asked about every few seconds and never change their day. */
export function localDayMemo(ms: number, timeZone: string): string {
  const key = `${timeZone} ${ms}`
  const earlier = known.get(key)
  if (earlier !== undefined) return earlier
  if (known.size >= LONGEST_MEMO) known.clear()
  const day = localDay(ms, timeZone)
  known.set(key, day)
  return day
}
