import { wallClock } from '@/lib/client/wall-clock'

/** The stretch of time that all tracks of a page share, UTC milliseconds. */
export type Axis = { fromMs: number; toMs: number }

const HOUR_MS = 3_600_000

/** Where a moment stands on the axis, in percent of its width; outside it below 0 or above 100. */
export function percentAt(axis: Axis, ms: number): number {
  return ((ms - axis.fromMs) / (axis.toMs - axis.fromMs)) * 100
}

/** Every `everyHours`th full hour of the unit's clock on the axis, with its label "08". Right also on days of 23 or 25 hours. */
export function axisHours(axis: Axis, timeZone: string, everyHours = 4): { ms: number; label: string }[] {
  const hours: { ms: number; label: string }[] = []
  const first = Number(wallClock(axis.fromMs, timeZone).time.slice(0, 2))
  for (let ms = axis.fromMs; ms <= axis.toMs; ms += HOUR_MS) {
    const label = wallClock(ms, timeZone).time.slice(0, 2)
    if ((Number(label) - first) % everyHours === 0 && hours.at(-1)?.label !== label) hours.push({ ms, label })
  }
  return hours
}
