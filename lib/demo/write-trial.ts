import { judgeStop } from '@/lib/weaning/stop/judge-stop'
import { rulesMet } from '@/lib/weaning/stop/rules-met'
import type { TrialTechnique } from '@/lib/weaning/vocabulary'
import { MINUTE_MS } from '@/lib/shared/time'
import { observedReadings, type Vitals } from './physiology'
import type { TrialScript } from './script'
import { entry, protocolAt, unitAt, type Course, type World } from './world'

const TECHNIQUES: { technique: TrialTechnique; pressureSupportCmH2O: number | null; peepCmH2O: number | null }[] = [
  { technique: 'pressure_support', pressureSupportCmH2O: 5, peepCmH2O: 5 },
  { technique: 'pressure_support', pressureSupportCmH2O: 7, peepCmH2O: 0 },
  { technique: 'pressure_support', pressureSupportCmH2O: 8, peepCmH2O: 5 },
  { technique: 'cpap', pressureSupportCmH2O: null, peepCmH2O: 5 },
  { technique: 't_piece', pressureSupportCmH2O: null, peepCmH2O: null },
]

/** Adds a breathing trial: start with baseline, looks, and end with the stop rules that its looks meet. */
export function writeTrial(world: World, course: Course, vitals: Vitals, script: TrialScript): void {
  const { random, rows } = world
  const baseline = observedReadings(random, vitals, 0)
  const trial = {
    ...entry(world, course, script.startMs, 'rt'),
    ...random.pick(TECHNIQUES),
    fio2Fraction: vitals.fio2Fraction,
    plannedDurationMin: script.plannedMin,
    baseline,
    startedAnywayBecause: null,
  }
  rows.trials.push(trial)
  const looks = script.looks.map(({ minute, strain, isDistressed }) => {
    const atMs = script.startMs + minute * MINUTE_MS
    const signs = isDistressed
      ? (['accessory_muscles', 'sweating'] as const)
      : strain > 0.7
        ? (['accessory_muscles'] as const)
        : []
    const readings = observedReadings(random, vitals, strain, [...signs])
    rows.trialObservations.push({
      ...entry(world, course, atMs, random.chance(0.9) ? 'rt' : 'nurse'),
      trialId: trial.entryId,
      readings,
    })
    return { atMs, readings }
  })
  if (script.endMs === null || script.outcome === null) return
  const { content } = protocolAt(unitAt(course.stays, script.startMs), script.startMs)
  rows.trialEnds.push({
    ...entry(world, course, script.endMs, 'rt'),
    trialId: trial.entryId,
    outcome: script.outcome,
    rulesMet: rulesMet(judgeStop(content.trial.stopRules, baseline, looks, script.endMs)).ids,
    returnedTo:
      script.outcome === 'passed'
        ? 'Left on the settings of the trial'
        : `Back to PC-CSV, pressure support ${random.whole(10, 14)}, PEEP ${vitals.peepCmH2O} cmH2O`,
    reason:
      script.outcome === 'stopped'
        ? random.pick(['Called to imaging.', 'Bedside procedure brought forward.', 'Family meeting at the bedside.'])
        : null,
  })
}
