import { ageYears } from '@/lib/shared/time'
import { isAdult } from '@/lib/weaning/indices/is-adult'
import { judgeScreen } from '@/lib/weaning/screen/judge-screen'
import { screenReadings, type Vitals } from './physiology'
import type { DayScript } from './script'
import { entry, protocolAt, unitAt, type Course, type World } from './world'
import { writeDecision } from './write-decision'
import { writeHold } from './write-hold'
import { writeTrial } from './write-trial'

/** Adds what was recorded of one patient's ventilator day; screens are judged by the product's own rules under the protocol of that moment. */
export function writeDay(world: World, course: Course, vitals: Vitals, script: DayScript): void {
  if (script.screen) writeScreen(world, course, vitals, script.screen)
  if (script.hold) writeHold(world, course, vitals, script.hold)
  if (script.trial) writeTrial(world, course, vitals, script.trial)
  if (script.decision) writeDecision(world, course, script.decision)
}

function writeScreen(world: World, course: Course, vitals: Vitals, script: NonNullable<DayScript['screen']>): void {
  const base = entry(world, course, script.atMs, 'rt')
  if (script.kind === 'excused') {
    world.rows.screens.push({
      ...base,
      result: 'excused',
      excuse: script.excuse,
      note: script.note,
      readings: null,
      verdict: null,
    })
    return
  }
  const readings = screenReadings(world.random, vitals, script.kind === 'incomplete')
  const { content } = protocolAt(unitAt(course.stays, script.atMs), script.atMs)
  const verdict = judgeScreen(content.screen, readings, isAdult(ageYears(course.patient.birthDate, base.ventilatorDay)))
  world.rows.screens.push({ ...base, result: verdict.result, excuse: null, note: null, readings, verdict })
}
