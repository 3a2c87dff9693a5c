import { HOUR_MS, MINUTE_MS } from '@/lib/shared/time'
import { HOLD_SAFETY_ITEMS, NOT_TODAY_REASONS, type SupportAfter } from '@/lib/weaning/vocabulary'
import type { DayScript, HoldScript, TrialScript } from './script'
import type { World } from './world'

const LOOK_MINUTES = [2, 5, 10, 15, 30, 45, 60]

/** A morning on which everything goes well, up to the tube being out. */
export function planLiberation(world: World, dayIndex: number): { script: DayScript; extubatedMs: number } {
  const { random } = world
  const { script, trialEndMs } = planPassedTrial(world, dayIndex)
  const atMs = trialEndMs + Math.round(random.chance(0.75) ? random.between(10, 70) : random.between(70, 240)) * MINUTE_MS
  const supportAfter: SupportAfter = random.pick(['oxygen', 'oxygen', 'oxygen', 'high_flow', 'high_flow', 'niv'])
  const decision = { atMs, choice: 'extubate' as const, reasons: [], lookAgainMs: null, supportAfter, note: null }
  return { script: { ...script, decision }, extubatedMs: atMs + random.whole(12, 100) * MINUTE_MS }
}

/** A day on which a patient who is ready does not get off the ventilator, for one of the usual reasons. */
export function planSetback(world: World, dayIndex: number): DayScript {
  const { random } = world
  const fate = random.next()
  if (fate < 0.03) return { screen: { ...planScreen(world, dayIndex), kind: 'incomplete' } }
  if (fate < 0.08) return planUnsafe(world, dayIndex)
  if (fate < 0.26) return planNotTolerated(world, dayIndex)
  if (fate < 0.68) return planFailedTrial(world, dayIndex)
  if (fate < 0.74) return planStoppedTrial(world, dayIndex)
  const { script, trialEndMs } = planPassedTrial(world, dayIndex)
  const atMs = trialEndMs + random.whole(15, 100) * MINUTE_MS
  const reasons = [random.pick(NOT_TODAY_REASONS.filter((reason) => reason !== 'other'))]
  const lookAgainMs = atMs + random.pick([4, 6, 20, 22]) * HOUR_MS
  return { ...script, decision: { atMs, choice: 'not_today', reasons, lookAgainMs, supportAfter: null, note: null } }
}

/** A screen within the window, sometimes a little late. */
export function planScreen({ random, calendar }: World, dayIndex: number): { atMs: number; kind: 'readings' | 'incomplete' } {
  return { atMs: calendar.at(dayIndex, random.chance(0.94) ? random.whole(308, 462) : random.whole(470, 560)), kind: 'readings' }
}

function planUnsafe(world: World, dayIndex: number): DayScript {
  const screen = planScreen(world, dayIndex)
  return {
    screen,
    hold: {
      kind: 'unsafe',
      atMs: screen.atMs + world.random.whole(5, 60) * MINUTE_MS,
      item: world.random.pick(HOLD_SAFETY_ITEMS),
    },
  }
}

function planNotTolerated(world: World, dayIndex: number): DayScript {
  const { random } = world
  const screen = planScreen(world, dayIndex)
  const startMs = screen.atMs + random.whole(8, 60) * MINUTE_MS
  const first = random.whole(14, 34)
  const lookMinutes = [first, first + random.whole(12, 22), first + random.whole(29, 34)]
  const endMs = startMs + ((lookMinutes.at(-1) ?? 0) + random.whole(1, 5)) * MINUTE_MS
  return { screen, hold: { kind: 'started', startMs, lookMinutes, endMs, outcome: 'not_tolerated' } }
}

function planFailedTrial(world: World, dayIndex: number): DayScript {
  const { random } = world
  const { script, readyMs } = planHold(world, dayIndex)
  const failAt = random.pick([10, 15, 30])
  const minutes = LOOK_MINUTES.filter((minute) => minute <= failAt)
  const isDistressed = random.chance(0.35)
  const looks = minutes.map((minute, index) => {
    const fromEnd = minutes.length - 1 - index
    if (isDistressed) return { minute, strain: fromEnd === 0 ? 0.85 : 0.35, isDistressed: fromEnd === 0 }
    return { minute, strain: fromEnd <= 1 ? random.between(1, 1.15) : 0.55 }
  })
  const trial: TrialScript = {
    startMs: readyMs,
    plannedMin: 30,
    looks,
    endMs: readyMs + (failAt + random.whole(1, 4)) * MINUTE_MS,
    outcome: 'failed',
  }
  return { ...script, trial }
}

function planStoppedTrial(world: World, dayIndex: number): DayScript {
  const { script, readyMs } = planHold(world, dayIndex)
  const looks = [2, 5, 10].map((minute) => ({ minute, strain: 0.2 }))
  return {
    ...script,
    trial: {
      startMs: readyMs,
      plannedMin: 30,
      looks,
      endMs: readyMs + world.random.whole(11, 20) * MINUTE_MS,
      outcome: 'stopped',
    },
  }
}

function planPassedTrial(world: World, dayIndex: number): { script: DayScript; trialEndMs: number } {
  const { random } = world
  const { script, readyMs } = planHold(world, dayIndex)
  const plannedMin = random.chance(0.75) ? 30 : 60
  const strain = random.between(0.08, 0.45)
  const looks = LOOK_MINUTES.filter((minute) => minute <= plannedMin).map((minute) => ({
    minute,
    strain: strain * random.between(0.6, 1),
  }))
  const endMs = readyMs + (plannedMin + random.whole(0, 5)) * MINUTE_MS
  return { script: { ...script, trial: { startMs: readyMs, plannedMin, looks, endMs, outcome: 'passed' } }, trialEndMs: endMs }
}

/** Screen and hold of a day that leads to a trial, and when the trial begins: within two hours of the hold on most days, not on all. */
function planHold(
  world: World,
  dayIndex: number,
): { script: { screen: { atMs: number; kind: 'readings' | 'incomplete' }; hold: HoldScript }; readyMs: number } {
  const { random } = world
  const screen = planScreen(world, dayIndex)
  if (random.chance(0.4)) {
    const atMs = screen.atMs + random.whole(3, 40) * MINUTE_MS
    return { script: { screen, hold: { kind: 'not_needed', atMs } }, readyMs: atMs + random.whole(8, 80) * MINUTE_MS }
  }
  const startMs = screen.atMs + random.whole(8, 65) * MINUTE_MS
  const last = random.whole(20, 60)
  const lookMinutes = last > 35 ? [Math.round(last / 2), last] : [last]
  const endMs = startMs + (last + random.whole(1, 4)) * MINUTE_MS
  const waitMin = random.chance(0.75) ? random.whole(5, 50) : random.whole(90, 200)
  return {
    script: { screen, hold: { kind: 'started', startMs, lookMinutes, endMs, outcome: 'tolerated' } },
    readyMs: endMs + waitMin * MINUTE_MS,
  }
}
