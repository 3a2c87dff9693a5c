import { HOUR_MS, MINUTE_MS } from '@/lib/shared/time'
import { addPatient, addStays } from './patients'
import { makeVitals, type Vitals } from './physiology'
import { planLiberation } from './plan-day'
import type { EpisodePlan } from './plan-episode'
import type { DayScript } from './script'
import type { Course, DemoUnit, PlacedStay, World } from './world'
import { writeDay } from './write-day'
import { writeEpisode } from './write-episode'
import { writeGas, writeSettings } from './write-readings'

export type Place = { unit: DemoUnit; bed: { id: string } }
/** Writes the patient of one bed as they are now. Answers since when the bed is taken; null for a bed that stays empty. */
export type Scene = (world: World, place: Place) => number | null

type Ventilated = {
  /** Whole days since ventilation began, at least 1: the episode began before today. */
  daysAgo: number
  isIll?: boolean
  ageYears?: number
  hasTracheostomy?: boolean
  /** What has happened today up to now; minutes count from midnight, ago() back from now. */
  today?: (at: (minutes: number) => number, ago: (minutes: number) => number) => DayScript
  after?: (world: World, course: Course, vitals: Vitals) => void
}

/** A patient on the ventilator: earlier days by chance, today as told. */
export function ventilated(given: Ventilated): Scene {
  return (world, { unit, bed }) => {
    const { calendar, random, nowMs } = world
    const daysAgo = Math.min(given.daysAgo, calendar.todayIndex - 1)
    const startedMs = calendar.at(calendar.todayIndex - daysAgo, random.whole(620, 1380))
    const admittedMs = startedMs - random.whole(8, 300) * MINUTE_MS
    const patient = addPatient(world, admittedMs, given.ageYears === undefined ? {} : { ageYears: given.ageYears })
    const stays: PlacedStay[] = [{ unit, bed, startMs: admittedMs, endMs: null, end: null }]
    addStays(world, patient, stays)
    const tracheostomyMs = given.hasTracheostomy ? calendar.at(calendar.todayIndex - Math.ceil(daysAgo / 2), 700) : null
    const plan: EpisodePlan = {
      startMs: startedMs,
      start: 'intubated',
      endMs: null,
      end: null,
      lastDay: null,
      isComfort: false,
      tracheostomyMs,
    }
    const course = writeEpisode(world, patient, stays, plan, {
      settingsPerDay: 3,
      throughIndex: calendar.todayIndex - 1,
      isScreened: given.ageYears === undefined,
    })
    const vitals = makeVitals(
      random,
      given.isIll ? random.between(0.5, 0.75) : random.between(0.06, 0.2),
      patient.heightCm ?? 170,
    )
    const at = (minutes: number) => Math.min(calendar.at(calendar.todayIndex, minutes), nowMs - MINUTE_MS)
    writeGas(world, course, at(random.whole(285, 350)), vitals)
    writeSettings(world, course, at(random.whole(270, 284)), vitals)
    given.after?.(world, course, vitals)
    if (given.today)
      writeDay(
        world,
        course,
        vitals,
        given.today(at, (minutes) => Math.floor(nowMs / MINUTE_MS - minutes) * MINUTE_MS),
      )
    return admittedMs
  }
}

/** Intubated this morning, after the window for screening had closed. */
export const startedAfterWindow: Scene = (world, { unit, bed }) => {
  const { nowMs, random } = world
  const admittedMs = Math.floor(nowMs / MINUTE_MS - 1203) * MINUTE_MS
  const patient = addPatient(world, admittedMs)
  const stays: PlacedStay[] = [{ unit, bed, startMs: admittedMs, endMs: null, end: null }]
  addStays(world, patient, stays)
  const plan: EpisodePlan = {
    startMs: Math.floor(nowMs / MINUTE_MS - 21) * MINUTE_MS,
    start: 'intubated',
    endMs: null,
    end: null,
    lastDay: null,
    isComfort: false,
    tracheostomyMs: null,
  }
  const course = writeEpisode(world, patient, stays, plan, {
    settingsPerDay: 3,
    throughIndex: world.calendar.todayIndex - 1,
    isScreened: true,
  })
  writeSettings(world, course, Math.floor(nowMs / MINUTE_MS - 9) * MINUTE_MS, makeVitals(random, 0.8, patient.heightCm ?? 170))
  return admittedMs
}

/** In the unit without a ventilator. */
export const notVentilated: Scene = (world, { unit, bed }) => {
  const admittedMs = Math.floor(world.nowMs / MINUTE_MS - world.random.whole(850, 2400)) * MINUTE_MS
  const patient = addPatient(world, admittedMs)
  addStays(world, patient, [{ unit, bed, startMs: admittedMs, endMs: null, end: null }])
  return admittedMs
}

/** Extubated as planned yesterday; within the watch. */
export const inWatch: Scene = (world, { unit, bed }) => {
  const { calendar, random } = world
  const yesterday = calendar.todayIndex - 1
  const startMs = calendar.at(yesterday - Math.min(4, yesterday - 1), 900)
  const admittedMs = startMs - 2 * HOUR_MS
  const patient = addPatient(world, admittedMs)
  const stays: PlacedStay[] = [{ unit, bed, startMs: admittedMs, endMs: null, end: null }]
  addStays(world, patient, stays)
  const { script, extubatedMs } = planLiberation(world, yesterday)
  const plan: EpisodePlan = {
    startMs,
    start: 'intubated',
    endMs: extubatedMs,
    end: 'extubated',
    lastDay: script,
    isComfort: false,
    tracheostomyMs: null,
  }
  writeEpisode(world, patient, stays, plan, { settingsPerDay: random.whole(3, 4), throughIndex: yesterday, isScreened: true })
  return admittedMs
}

export const empty: Scene = () => null
