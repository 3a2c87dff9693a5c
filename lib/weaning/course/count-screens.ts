import type { ScreenResult } from '@/lib/weaning/vocabulary'
import { type ReviewEpisode, type VentilatedDay } from './count-unit-days'

export type ReviewScreen = { episodeId: string; ventilatorDay: string; observedMs: number; result: ScreenResult }

/** Of a month's ventilator days: excused + startedAfterWindow + notAdult + notYetDue + eligible make the whole. */
export type ScreenCounts = {
  eligible: number
  done: number
  /** Eligible, with a screen that was left incomplete and none complete. */
  incomplete: number
  excused: number
  startedAfterWindow: number
  /** Under 18, or age not known. */
  notAdult: number
  /** Today, while the screening window is open. */
  notYetDue: number
}

const NOTHING: ScreenCounts = {
  eligible: 0,
  done: 0,
  incomplete: 0,
  excused: 0,
  startedAfterWindow: 0,
  notAdult: 0,
  notYetDue: 0,
}

/**
 * Screens done of the ventilator days eligible, by month. The first entry of a day decides whether it was excused; a complete screen
 * (ready or not ready) makes it done, an incomplete one does not. Each day falls under one heading only.
 * @example countScreens(ventilated, screens, episodes).of('2026-11') // { eligible: 150, done: 141, … }
 */
export function countScreens(
  ventilated: readonly VentilatedDay[],
  screens: readonly ReviewScreen[],
  episodes: readonly ReviewEpisode[],
) {
  const patientOf = new Map(episodes.map(({ episodeId, patientId }) => [episodeId, patientId]))
  const ofPatients = new Map<string, Map<string, ReviewScreen[]>>()
  for (const screen of screens) {
    const patientId = patientOf.get(screen.episodeId)
    if (patientId === undefined) continue
    const days = ofPatients.get(patientId) ?? new Map<string, ReviewScreen[]>()
    ofPatients.set(patientId, days)
    const known = days.get(screen.ventilatorDay)
    if (known) known.push(screen)
    else days.set(screen.ventilatorDay, [screen])
  }
  const months = new Map<string, ScreenCounts>()
  for (const ventilatedDay of ventilated) {
    const month = ventilatedDay.day.day.slice(0, 7)
    const counts = months.get(month) ?? { ...NOTHING }
    months.set(month, counts)
    addDay(counts, ventilatedDay, ofPatients.get(ventilatedDay.patientId)?.get(ventilatedDay.day.day) ?? [])
  }
  return { of: (month: string): ScreenCounts => months.get(month) ?? { ...NOTHING } }
}

function addDay(counts: ScreenCounts, ventilatedDay: VentilatedDay, screens: ReviewScreen[]): void {
  const exclusion = exclusionOf(ventilatedDay, screens)
  if (exclusion) {
    counts[exclusion] += 1
    return
  }
  counts.eligible += 1
  if (screens.some(({ result }) => result === 'ready' || result === 'not_ready')) counts.done += 1
  else if (screens.some(({ result }) => result === 'incomplete')) counts.incomplete += 1
}

function exclusionOf({ day, firstStartMs, birthDate, nowMs }: VentilatedDay, screens: ReviewScreen[]) {
  const first = screens.reduce<ReviewScreen | null>(
    (earliest, one) => (earliest && earliest.observedMs <= one.observedMs ? earliest : one),
    null,
  )
  if (!isAdultOn(birthDate, day.day)) return 'notAdult'
  if (first?.result === 'excused') return 'excused'
  if (firstStartMs > day.closesMs) return 'startedAfterWindow'
  if (nowMs <= day.closesMs) return 'notYetDue'
  return null
}

/** Both days are yyyy-mm-dd, so that the text order is the calendar's. */
function isAdultOn(birthDate: string | null, day: string): boolean {
  return birthDate !== null && `${Number(birthDate.slice(0, 4)) + 18}${birthDate.slice(4)}` <= day
}
