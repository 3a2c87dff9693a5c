import { HOUR_MS } from '@/lib/shared/time'
import { addPatient, addStays } from './patients'
import { planEpisode, type EpisodePlan } from './plan-episode'
import type { DemoUnit, PlacedStay, World } from './world'
import { writeEpisode } from './write-episode'

const DAY_MS = 24 * HOUR_MS
const TRIES_TO_FIT = 14
/** How often a planned, and an unplanned, extubation is followed by reintubation within a week. */
const REINTUBATED = { planned: 0.115, unplanned: 0.4 }

/** A bed as the history fills it: free since when, and taken from when by the patient who lies there today. */
export type HistoryBed = { unit: DemoUnit; bed: { id: string }; freeMs: number; takenMs: number }
type StayPlan = { startMs: number; endMs: number; end: 'left_unit' | 'died'; episodes: EpisodePlan[] }

/** Fills the beds with patients, one after the other, until those of today take them over. */
export function writeHistory(world: World, beds: HistoryBed[]): void {
  const monthNoise = new Map<string, number>()
  for (;;) {
    const bed = beds.reduce((earliest, one) => (one.freeMs < earliest.freeMs ? one : earliest))
    if (bed.freeMs >= bed.takenMs) {
      if (beds.every((one) => one.freeMs >= one.takenMs)) return
      bed.freeMs = Infinity
      continue
    }
    const plan = planFittingStay(world, bed, monthNoise)
    if (!plan) {
      bed.freeMs = bed.takenMs
      continue
    }
    placeStay(world, beds, bed, plan)
  }
}

function planFittingStay(world: World, bed: HistoryBed, monthNoise: Map<string, number>): StayPlan | null {
  for (let attempt = 0; attempt < TRIES_TO_FIT; attempt += 1) {
    const plan = planStay(world, bed, monthNoise)
    if (plan.endMs < bed.takenMs - HOUR_MS) return plan
  }
  return null
}

function planStay(world: World, bed: HistoryBed, monthNoise: Map<string, number>): StayPlan {
  const { random, calendar } = world
  const startMs = bed.freeMs + Math.round(-Math.log(1 - random.next()) * 6) * HOUR_MS + random.whole(20, 90) * 60_000
  const elapsed = calendar.indexOf(startMs) / Math.max(1, calendar.todayIndex)
  if (!random.chance(0.5 - 0.07 * elapsed))
    return {
      startMs,
      endMs: startMs + Math.round(random.between(0.7, 4.2) * DAY_MS),
      end: random.chance(0.03) ? 'died' : 'left_unit',
      episodes: [],
    }
  const month = calendar.dayOf(startMs).slice(0, 7)
  const noise = monthNoise.get(month) ?? random.between(0.9, 1.1)
  monthNoise.set(month, noise)
  const begunMs = startMs + (random.chance(0.7) ? random.whole(0, 90) * 60_000 : Math.round(random.between(2, 40) * HOUR_MS))
  const isArrived = begunMs - startMs < 20 * 60_000
  return planVentilated(world, startMs, begunMs, isArrived, (4.1 - 1.1 * elapsed) * noise)
}

function planVentilated(world: World, startMs: number, begunMs: number, isArrived: boolean, medianDays: number): StayPlan {
  const { random } = world
  const episodes = [planEpisode(world, begunMs, isArrived ? 'arrived_intubated' : 'intubated', medianDays)]
  for (;;) {
    const last = episodes.at(-1)
    if (!last || last.endMs === null) throw new Error('An episode of the past must have ended.')
    const { end, endMs, isComfort } = last
    if (end === 'died') return { startMs, endMs, end: 'died', episodes }
    if (end === 'left_hospital') return { startMs, endMs, end: 'left_unit', episodes }
    if (isComfort) return { startMs, endMs: endMs + Math.round(random.between(0.5, 20) * HOUR_MS), end: 'died', episodes }
    const risk = end === 'ventilator_off' ? 0 : end === 'extubated' ? REINTUBATED.planned : REINTUBATED.unplanned
    if (episodes.length < 3 && random.chance(risk)) {
      episodes.push(
        planEpisode(
          world,
          endMs + Math.round(hoursToReintubation(world, end === 'extubated') * HOUR_MS),
          'reintubated',
          medianDays,
        ),
      )
      continue
    }
    return {
      startMs,
      endMs: endMs + Math.round(random.between(0.8, 3) * DAY_MS),
      end: random.chance(0.02) ? 'died' : 'left_unit',
      episodes,
    }
  }
}

function hoursToReintubation({ random }: World, wasPlanned: boolean): number {
  if (!wasPlanned) return random.between(0.1, 12)
  const when = random.next()
  if (when < 0.68) return random.between(0.5, 47)
  return when < 0.82 ? random.between(48, 72) : random.between(72, 160)
}

/** Now and then a patient moves to a free bed of another unit; all else stays where it began. */
function placeStay(world: World, beds: HistoryBed[], bed: HistoryBed, plan: StayPlan): void {
  const { random } = world
  const moveMs = Math.round(random.between(plan.startMs + 10 * HOUR_MS, plan.endMs - 10 * HOUR_MS))
  const target =
    plan.endMs - plan.startMs > 1.5 * DAY_MS && random.chance(0.08)
      ? beds.find((one) => one.unit !== bed.unit && one.freeMs < moveMs - HOUR_MS && one.takenMs > plan.endMs + HOUR_MS)
      : undefined
  const { startMs, endMs, end } = plan
  const stays: PlacedStay[] = target
    ? [
        { unit: bed.unit, bed: bed.bed, startMs, endMs: moveMs, end: 'moved' },
        { unit: target.unit, bed: target.bed, startMs: moveMs, endMs, end },
      ]
    : [{ unit: bed.unit, bed: bed.bed, startMs, endMs, end }]
  bed.freeMs = target ? moveMs : endMs
  if (target) target.freeMs = endMs
  const patient = addPatient(world, startMs)
  addStays(world, patient, stays)
  for (const episode of plan.episodes)
    writeEpisode(world, patient, stays, episode, { settingsPerDay: 2, throughIndex: world.calendar.todayIndex, isScreened: true })
}
