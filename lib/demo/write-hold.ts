import type { Infusion } from '@/db/schema'
import type { SeedRows } from '@/db/seed'
import { judgeStop } from '@/lib/weaning/stop/judge-stop'
import { rulesMet } from '@/lib/weaning/stop/rules-met'
import { HOLD_SAFETY_ITEMS } from '@/lib/weaning/vocabulary'
import { MINUTE_MS } from '@/lib/shared/time'
import { observedReadings, type Vitals } from './physiology'
import type { HoldScript } from './script'
import { entry, protocolAt, unitAt, type Course, type World } from './world'

/** Adds a sedation hold: its start, its looks and its end. */
export function writeHold(world: World, course: Course, vitals: Vitals, script: HoldScript): void {
  if (script.kind === 'started') return writeStarted(world, course, vitals, script)
  const isUnsafe = script.kind === 'unsafe'
  const safety = isUnsafe ? Object.fromEntries(HOLD_SAFETY_ITEMS.map((item) => [item, item === script.item])) : null
  world.rows.holds.push({
    ...entry(world, course, script.atMs, 'nurse'),
    start: script.kind,
    safety,
    infusions: isUnsafe ? makeInfusions(world, course) : [],
    note: null,
  })
}

function writeStarted(world: World, course: Course, vitals: Vitals, script: Extract<HoldScript, { kind: 'started' }>): void {
  const { random, rows } = world
  const safety = Object.fromEntries(HOLD_SAFETY_ITEMS.map((item) => [item, false]))
  const infusions = makeInfusions(world, course)
  const hold = { ...entry(world, course, script.startMs, 'nurse'), start: 'started' as const, safety, infusions, note: null }
  rows.holds.push(hold)
  const looks = script.lookMinutes.map((minute, index) => {
    const isLast = index === script.lookMinutes.length - 1
    const isAgitated = script.outcome === 'not_tolerated' && index >= script.lookMinutes.length - 2
    const rass = isAgitated ? random.whole(2, 3) : Math.round(-3 + (2.6 * (index + 1)) / script.lookMinutes.length)
    const readings = { ...observedReadings(random, vitals, isAgitated ? 0.6 : 0.15, isAgitated ? ['agitation'] : []), rass }
    const observedAt = script.startMs + minute * MINUTE_MS
    const opensEyesToVoice =
      script.outcome === 'tolerated' && isLast ? ('yes' as const) : isAgitated ? ('yes' as const) : ('no' as const)
    rows.holdObservations.push({ ...entry(world, course, observedAt, 'nurse'), holdId: hold.entryId, readings, opensEyesToVoice })
    return { atMs: observedAt, readings }
  })
  if (script.endMs === null || script.outcome === null) return
  const { content } = protocolAt(unitAt(course.stays, script.startMs), script.startMs)
  rows.holdEnds.push({
    ...entry(world, course, script.endMs, 'nurse'),
    holdId: hold.entryId,
    outcome: script.outcome,
    rulesMet: rulesMet(judgeStop(content.hold.failRules, null, looks, script.endMs)).ids,
    restarts: script.outcome === 'tolerated' ? [] : makeRestarts(infusions, content.hold.restartFraction),
    note:
      script.outcome === 'stopped'
        ? random.pick(['Called away to imaging.', 'Dressing change brought forward.', 'Line placement.'])
        : null,
  })
}

/** Invented but usual rates; a weight of 70 kg where none is known. */
function makeInfusions({ random }: World, { patient }: Course): Infusion[] {
  const weightKg = patient.weightKg ?? 70
  const sedatives: Infusion[] = [
    { drug: 'propofol', rate: Math.round(weightKg * random.between(1, 2.6)), unit: 'mg/h', purpose: 'sedation' },
    { drug: 'dexmedetomidine', rate: Number(random.between(0.3, 1).toFixed(1)), unit: 'µg/kg/h', purpose: 'sedation' },
    { drug: 'midazolam', rate: random.whole(2, 6), unit: 'mg/h', purpose: 'sedation' },
  ]
  const pain: Infusion[] = random.chance(0.55)
    ? [{ drug: 'fentanyl', rate: random.whole(2, 8) * 12.5, unit: 'µg/h', purpose: 'pain' }]
    : []
  return [random.pick([...sedatives.slice(0, 1), ...sedatives]), ...pain]
}

function makeRestarts(infusions: Infusion[], fraction: number): SeedRows['holdEnds'][number]['restarts'] {
  return infusions
    .filter(({ purpose }) => purpose === 'sedation')
    .map(({ drug, unit, rate }) => ({ drug, unit, rateBefore: rate, rate: rate * fraction }))
}
