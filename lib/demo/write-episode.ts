import { MINUTE_MS } from '@/lib/shared/time'
import { AIRWAY_EVENTS, type AirwayEvent } from '@/lib/weaning/vocabulary'
import { makeVitals, type Vitals } from './physiology'
import { planScreen, planSetback } from './plan-day'
import type { EpisodePlan } from './plan-episode'
import type { DayScript } from './script'
import { entry, protocolAt, unitAt, type Course, type DemoPatient, type PlacedStay, type World } from './world'
import { writeDay } from './write-day'
import { writeGas, writeSettings } from './write-readings'

type Options = {
  settingsPerDay: number
  /** The last day that is written by chance; today is scripted for those still ventilated. */
  throughIndex: number
  /** False for those whom no screen can be recorded for. */
  isScreened: boolean
}

/** Adds an episode with its airway events and the entries of each of its days. Answers the course, for what is still to be written. */
export function writeEpisode(
  world: World,
  patient: DemoPatient,
  stays: readonly PlacedStay[],
  plan: EpisodePlan,
  options: Options,
): Course {
  const { calendar, random, rows } = world
  const course: Course = { episodeId: random.id(), patient, stays }
  const startUnit = unitAt(stays, plan.startMs)
  rows.episodes.push({
    id: course.episodeId,
    patientId: patient.id,
    startedAt: plan.startMs,
    start: plan.start,
    airway: plan.tracheostomyMs === null ? 'endotracheal_tube' : 'tracheostomy',
    endedAt: plan.endMs,
    end: plan.end,
    recordedAt: plan.startMs + 6 * MINUTE_MS,
    recordedBy: random.pick(startUnit.staff.rt),
    endRecordedAt: plan.endMs === null ? null : Math.min(world.nowMs, plan.endMs + 5 * MINUTE_MS),
    endRecordedBy: plan.endMs === null ? null : random.pick(unitAt(stays, plan.endMs).staff.rt),
    version: plan.endMs === null ? 1 : 2,
  })
  writeAirwayEvents(world, course, plan)
  const firstIndex = calendar.indexOf(plan.startMs)
  const lastIndex = plan.endMs === null ? calendar.todayIndex : calendar.indexOf(plan.endMs)
  const illness = random.between(0.55, 1)
  const readyFrom = random.between(0.45, 0.8)
  for (let index = firstIndex; index <= Math.min(lastIndex, options.throughIndex); index += 1) {
    const isLast = index === lastIndex
    const progress = lastIndex === firstIndex ? 1 : (index - firstIndex) / (lastIndex - firstIndex)
    const severity = severityOn(world, plan, { progress, illness, readyFrom, isLast })
    const vitals = makeVitals(random, severity, patient.heightCm ?? 170)
    const script =
      isLast && plan.lastDay ? plan.lastDay : options.isScreened ? scriptOf(world, course, plan, index, severity) : {}
    writeDay(world, course, vitals, withinEpisode(script, plan, world.nowMs))
    writeReadings(world, course, plan, index, vitals, options.settingsPerDay)
  }
  return course
}

function writeAirwayEvents(world: World, course: Course, plan: EpisodePlan): void {
  const add = (event: AirwayEvent, atMs: number, supportAfter: 'oxygen' | 'high_flow' | 'niv' | null = null) =>
    world.rows.airwayEvents.push({ ...entry(world, course, atMs, 'rt', 4), event, reason: null, supportAfter })
  add(plan.start, plan.startMs)
  if (plan.tracheostomyMs !== null) add('tracheostomy_placed', plan.tracheostomyMs)
  const end = AIRWAY_EVENTS.find((event) => event === plan.end)
  if (end && plan.endMs !== null)
    add(end, plan.endMs, end === 'ventilator_off' ? null : (plan.lastDay?.decision?.supportAfter ?? 'oxygen'))
}

type Progress = { progress: number; illness: number; readyFrom: number; isLast: boolean }

/** 0.33 and more is too ill for a trial; who dies gets more ill instead of better. */
function severityOn({ random }: World, plan: EpisodePlan, { progress, illness, readyFrom, isLast }: Progress): number {
  if (plan.end === 'died' || plan.isComfort) return Math.min(1, 0.5 + 0.45 * progress + random.between(-0.05, 0.1))
  if (isLast && plan.lastDay) return random.between(0.03, 0.24)
  if (progress < readyFrom || random.chance(0.15))
    return Math.max(0.35, illness * (1 - progress) + 0.35 * progress + random.normal(0, 0.05))
  return random.between(0.05, 0.28)
}

function scriptOf(world: World, course: Course, plan: EpisodePlan, index: number, severity: number): DayScript {
  const { random, calendar } = world
  const { content } = protocolAt(unitAt(course.stays, calendar.at(index, 0)), calendar.at(index, 0))
  if (plan.startMs > calendar.at(index, content.screeningWindow.closesMin)) return {}
  if (random.chance(calendar.isWeekend(index) ? 0.11 : 0.065)) return {}
  const script = severity >= 0.3 ? planIllDay(world, plan, index) : planSetback(world, index)
  const { screen } = script
  // Intubated during the morning: screened soon after, and nothing more that day.
  return screen && screen.atMs <= plan.startMs
    ? { screen: { ...screen, atMs: plan.startMs + random.whole(15, 50) * MINUTE_MS } }
    : script
}

function planIllDay(world: World, plan: EpisodePlan, index: number): DayScript {
  const { random } = world
  const screen = planScreen(world, index)
  const isExcused = random.chance(plan.isComfort || plan.end === 'died' ? 0.2 : 0.05)
  if (!isExcused) return { screen: { ...screen, kind: random.chance(0.03) ? 'incomplete' : 'readings' } }
  const excuse = plan.isComfort ? 'comfort_care' : random.pick(['prone', 'prone', 'planned_procedure', 'ecmo'] as const)
  return { screen: { atMs: screen.atMs, kind: 'excused', excuse, note: null } }
}

/** Leaves out what would lie before the start, after the end or after now, from the first such step on. */
function withinEpisode(script: DayScript, plan: EpisodePlan, nowMs: number): DayScript {
  const endMs = Math.min(plan.endMs ?? nowMs, nowMs)
  const { screen, hold, trial, decision } = script
  const kept: DayScript = {}
  if (!screen || screen.atMs < plan.startMs || screen.atMs > endMs) return kept
  kept.screen = screen
  const holdEndMs = hold?.kind === 'started' ? (hold.endMs ?? endMs) : hold?.atMs
  if (hold && holdEndMs !== undefined && holdEndMs <= endMs) kept.hold = hold
  if (trial && kept.hold && (trial.endMs ?? endMs) <= endMs) kept.trial = trial
  if (decision && decision.atMs <= endMs && (kept.trial || !trial)) kept.decision = decision
  return kept
}

function writeReadings(
  world: World,
  course: Course,
  plan: EpisodePlan,
  index: number,
  vitals: Vitals,
  settingsPerDay: number,
): void {
  const { random, calendar, nowMs } = world
  const times = settingsPerDay >= 3 ? [360, 840, 1290] : [390, 1140]
  const isFirst = index === calendar.indexOf(plan.startMs)
  const moments = [
    ...(isFirst ? [plan.startMs + 12 * MINUTE_MS] : []),
    ...times.map((minutes) => calendar.at(index, minutes + random.whole(-25, 25))),
  ]
  const endMs = Math.min(plan.endMs ?? nowMs, nowMs)
  for (const atMs of moments) if (atMs > plan.startMs && atMs < endMs) writeSettings(world, course, atMs, vitals)
  const gasMs = calendar.at(index, random.whole(300, 420))
  if (random.chance(0.65) && gasMs > plan.startMs && gasMs < endMs) writeGas(world, course, gasMs, vitals)
}
