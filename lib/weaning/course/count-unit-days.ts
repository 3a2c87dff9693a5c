import type { ReviewDay } from './monthly-measures'

/** A stay of a patient in a unit; endMs null while it lasts. */
export type ReviewStay = { patientId: string; unitId: string; startMs: number; endMs: number | null }
/** A run of invasive ventilation; endMs null while it lasts. */
export type ReviewEpisode = {
  episodeId: string
  patientId: string
  startMs: number
  endMs: number | null
  birthDate: string | null
}

/** One ventilator day of one patient that belongs to the unit. firstStartMs is when the earliest episode touching the day began. */
export type VentilatedDay = { patientId: string; day: ReviewDay; firstStartMs: number; birthDate: string | null; nowMs: number }

type Input = { unitId: string; days: ReviewDay[]; nowMs: number; stays: ReviewStay[]; episodes: ReviewEpisode[] }

/**
 * Patient days and ventilator days of a unit, by month. An interval counts on each day it touches, its start included and its end not:
 * extubated at 00:00 does not count for the day that begins. A day in two units belongs to the one where the patient was last.
 * Variant: each day that any part of the interval touches; surveillance counts once a day at a fixed hour (derived).
 * @example countUnitDays({ unitId, days, nowMs, stays, episodes }).patientDays.get('2026-11') // 31
 */
export function countUnitDays({ unitId, days, nowMs, stays, episodes }: Input) {
  const isHere = daysInUnit({ unitId, days, nowMs, stays })
  const patientDays = new Map<string, number>()
  for (const ofPatient of isHere.values()) for (const [index, isIn] of ofPatient) if (isIn) addOne(patientDays, days[index])
  const ventilatorDays = new Map<string, number>()
  const ventilated: VentilatedDay[] = []
  for (const [patientId, ofPatient] of groupByPatient(episodes)) {
    const seen = new Map<number, VentilatedDay>()
    for (const { startMs, endMs, birthDate } of ofPatient) {
      forEachDay(days, startMs, endMs, nowMs, (index, day) => {
        const known = seen.get(index)
        if (known) known.firstStartMs = Math.min(known.firstStartMs, startMs)
        else if (isHere.get(patientId)?.get(index)) seen.set(index, { patientId, day, firstStartMs: startMs, birthDate, nowMs })
      })
    }
    for (const one of seen.values()) {
      ventilated.push(one)
      addOne(ventilatorDays, one.day)
    }
  }
  return { patientDays, ventilatorDays, ventilated }
}

/** For each patient the days (by index) in any unit, and whether the last unit of the day was this one. */
function daysInUnit({ unitId, days, nowMs, stays }: Omit<Input, 'episodes'>): Map<string, Map<number, boolean>> {
  const found = new Map<string, Map<number, boolean>>()
  for (const [patientId, ofPatient] of groupByPatient(stays)) {
    const inUnit = new Map<number, boolean>()
    found.set(patientId, inUnit)
    ofPatient.sort((a, b) => a.startMs - b.startMs)
    for (const stay of ofPatient)
      forEachDay(days, stay.startMs, stay.endMs, nowMs, (index) => inUnit.set(index, stay.unitId === unitId))
  }
  return found
}

function groupByPatient<Row extends { patientId: string }>(rows: Row[]): Map<string, Row[]> {
  const groups = new Map<string, Row[]>()
  for (const row of rows) {
    const known = groups.get(row.patientId)
    if (known) known.push(row)
    else groups.set(row.patientId, [row])
  }
  return groups
}

function addOne(counts: Map<string, number>, day: ReviewDay | undefined): void {
  if (!day) return
  const month = day.day.slice(0, 7)
  counts.set(month, (counts.get(month) ?? 0) + 1)
}

/** The days that [startMs, endMs) touches; an empty interval touches the day of its start, an open one runs to now. */
function forEachDay(
  days: ReviewDay[],
  startMs: number,
  endMs: number | null,
  nowMs: number,
  visit: (index: number, day: ReviewDay) => void,
): void {
  if (startMs > nowMs) return
  const lastMs = Math.max(startMs, Math.min(endMs === null ? nowMs : endMs - 1, nowMs))
  for (let index = firstDayEndingAfter(days, startMs); index < days.length; index += 1) {
    const day = days[index]
    if (!day || day.startMs > lastMs) return
    visit(index, day)
  }
}

function firstDayEndingAfter(days: ReviewDay[], ms: number): number {
  let low = 0
  let high = days.length
  while (low < high) {
    const middle = (low + high) >> 1
    if ((days[middle]?.endMs ?? Infinity) > ms) high = middle
    else low = middle + 1
  }
  return low
}
