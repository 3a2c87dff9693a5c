import type { AirwayEvent } from '@/lib/weaning/vocabulary'

const HOUR_MS = 3_600_000
const EXTUBATIONS = ['extubated', 'self_extubated', 'accidentally_extubated'] as const satisfies readonly AirwayEvent[]
/** Any new tube after an extubation is a reintubation, whichever word it was recorded with. */
const INTUBATIONS: readonly AirwayEvent[] = ['reintubated', 'intubated', 'arrived_intubated']

export type Extubation = {
  extubatedMs: number
  event: (typeof EXTUBATIONS)[number]
  isPlanned: boolean
  reintubatedMs: number | null
  hoursBetween: number | null
  /** Each: true when reintubated within it, the limit included; false when not; null while the time has not yet passed. */
  within48h: boolean | null
  within72h: boolean | null
  within7d: boolean | null
}

/**
 * Every extubation of one patient with the reintubation that followed it, if any, derived from the airway events of all episodes.
 * Variant: 48 h, 72 h and 168 h from extubation to the next tube, each limit included. `followedUntilMs` is now, or the moment of death
 * or discharge when the caller ends the follow-up there. Source: Boles 2007, doi:10.1183/09031936.00010206 (48 h); 72 h and 7 d in later trials.
 * @example reintubations([{ event: 'extubated', atMs: 0 }, { event: 'reintubated', atMs: 180_000_000 }], nowMs) // 50 h: within 72 h and 7 d
 */
export function reintubations(events: readonly { event: AirwayEvent; atMs: number }[], followedUntilMs: number): Extubation[] {
  const sorted = [...events].sort((a, b) => a.atMs - b.atMs)
  return sorted.flatMap(({ event, atMs }, index) => {
    const extubation = EXTUBATIONS.find((candidate) => candidate === event)
    if (extubation === undefined) return []
    const later = sorted.slice(index + 1)
    const next = later.find((candidate) => INTUBATIONS.includes(candidate.event))
    const again = later.find((candidate) => EXTUBATIONS.some((word) => word === candidate.event))
    const isNextFirst = next !== undefined && (again === undefined || later.indexOf(next) < later.indexOf(again))
    return [toExtubation(extubation, atMs, isNextFirst ? next.atMs : null, followedUntilMs)]
  })
}

function toExtubation(
  event: Extubation['event'],
  extubatedMs: number,
  reintubatedMs: number | null,
  followedUntilMs: number,
): Extubation {
  const within = (hours: number): boolean | null => {
    if (reintubatedMs !== null) return reintubatedMs - extubatedMs <= hours * HOUR_MS
    return followedUntilMs - extubatedMs > hours * HOUR_MS ? false : null
  }
  return {
    extubatedMs,
    event,
    isPlanned: event === 'extubated',
    reintubatedMs,
    hoursBetween: reintubatedMs === null ? null : (reintubatedMs - extubatedMs) / HOUR_MS,
    within48h: within(48),
    within72h: within(72),
    within7d: within(168),
  }
}
