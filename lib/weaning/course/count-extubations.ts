import type { AirwayEvent } from '@/lib/weaning/vocabulary'
import { reintubations, type Extubation } from './reintubations'

export type ReviewAirwayEvent = {
  patientId: string
  unitId: string
  ventilatorDay: string
  observedMs: number
  event: AirwayEvent
}

/** Extubations whose time is over at the count, how many of them were reintubated within it, and those too recent to know. */
export type WindowCounts = { known: number; reintubated: number; tooRecent: number; tooRecentReintubated: number }
export type ReintubationCounts = { within48h: WindowCounts; within72h: WindowCounts; within7d: WindowCounts }
export type ExtubationCounts = {
  planned: number
  unplanned: number
  afterPlanned: ReintubationCounts
  afterUnplanned: ReintubationCounts
}

const WINDOWS = { within48h: 48, within72h: 72, within7d: 168 } as const
const HOUR_MS = 3_600_000

const emptyWindow = (): WindowCounts => ({ known: 0, reintubated: 0, tooRecent: 0, tooRecentReintubated: 0 })
const emptyReintubations = (): ReintubationCounts => ({
  within48h: emptyWindow(),
  within72h: emptyWindow(),
  within7d: emptyWindow(),
})
const emptyCounts = (): ExtubationCounts => ({
  planned: 0,
  unplanned: 0,
  afterPlanned: emptyReintubations(),
  afterUnplanned: emptyReintubations(),
})

/**
 * Extubations of a unit by month, and the reintubations that followed within 48 h, 72 h and 7 days, exactly that long included.
 * Both are attributed to the month and unit of the extubation. Only extubations whose time is over make a share, so that one
 * reintubated early does not weigh more than one that is still well.
 * @example countExtubations(events, 'unit', nowMs).of('2026-11').afterPlanned.within48h // { known: 20, reintubated: 2, … }
 */
export function countExtubations(events: readonly ReviewAirwayEvent[], unitId: string, nowMs: number) {
  const byPatient = new Map<string, ReviewAirwayEvent[]>()
  for (const event of events) {
    const known = byPatient.get(event.patientId)
    if (known) known.push(event)
    else byPatient.set(event.patientId, [event])
  }
  const months = new Map<string, ExtubationCounts>()
  for (const ofPatient of byPatient.values()) {
    ofPatient.sort((a, b) => a.observedMs - b.observedMs)
    const found = reintubations(
      ofPatient.map(({ event, observedMs }) => ({ event, atMs: observedMs })),
      nowMs,
    )
    // Both lists are by time, so that the first extubation found is the first extubation event.
    ofPatient
      .filter(({ event }) => isExtubation(event))
      .forEach((event, index) => {
        const extubation = found[index]
        if (event.unitId !== unitId || !extubation) return
        const month = event.ventilatorDay.slice(0, 7)
        const counts = months.get(month) ?? emptyCounts()
        months.set(month, counts)
        addExtubation(counts, extubation, nowMs)
      })
  }
  return { of: (month: string): ExtubationCounts => months.get(month) ?? emptyCounts() }
}

function addExtubation(counts: ExtubationCounts, extubation: Extubation, nowMs: number): void {
  counts[extubation.isPlanned ? 'planned' : 'unplanned'] += 1
  const after = extubation.isPlanned ? counts.afterPlanned : counts.afterUnplanned
  for (const window of Object.keys(WINDOWS) as (keyof typeof WINDOWS)[]) {
    const isOver = nowMs - extubation.extubatedMs > WINDOWS[window] * HOUR_MS
    after[window][isOver ? 'known' : 'tooRecent'] += 1
    if (extubation[window] === true) after[window][isOver ? 'reintubated' : 'tooRecentReintubated'] += 1
  }
}

function isExtubation(event: AirwayEvent): boolean {
  return event === 'extubated' || event === 'self_extubated' || event === 'accidentally_extubated'
}
