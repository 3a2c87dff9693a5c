import { z } from 'zod'
import type { ObservedReadings } from '@/lib/weaning/readings'
import type { StopState } from '@/lib/weaning/stop/observation'
import { BEDSIDE_SIGNS } from '@/lib/weaning/vocabulary'
import { optionalReading, requiredReading } from './reading'

const otherReadings = {
  tidalVolumeMl: optionalReading('tidalVolumeMl'),
  systolicMmHg: optionalReading('systolicMmHg'),
  diastolicMmHg: optionalReading('diastolicMmHg'),
  rass: optionalReading('rass'),
  paCO2MmHg: optionalReading('paCO2MmHg'),
  paO2MmHg: optionalReading('paO2MmHg'),
  ph: optionalReading('ph'),
  signs: z.array(z.enum(BEDSIDE_SIGNS)).max(BEDSIDE_SIGNS.length),
}

/** One look at the patient during a hold or a trial: every number may be left out (null). */
export const observedReadingsSchema = z
  .object({
    breathsPerMin: optionalReading('breathsPerMin'),
    spo2Percent: optionalReading('spo2Percent'),
    heartRatePerMin: optionalReading('heartRatePerMin'),
    ...otherReadings,
  })
  .superRefine(checkBloodPressure)

/** The baseline of a trial: rate, SpO2 and heart rate must stand, since a later change is judged against them. */
export const baselineReadingsSchema = z
  .object({
    breathsPerMin: requiredReading('breathsPerMin'),
    spo2Percent: requiredReading('spo2Percent'),
    heartRatePerMin: requiredReading('heartRatePerMin'),
    ...otherReadings,
  })
  .superRefine(checkBloodPressure)

function checkBloodPressure(
  readings: { systolicMmHg: number | null; diastolicMmHg: number | null },
  issues: z.RefinementCtx,
): void {
  const { systolicMmHg, diastolicMmHg } = readings
  if (systolicMmHg === null || diastolicMmHg === null || diastolicMmHg < systolicMmHg) return
  issues.addIssue({
    code: 'custom',
    path: ['diastolicMmHg'],
    message: `Diastolic is below systolic (${systolicMmHg} mmHg). Swapped?`,
  })
}

/** Whether anything at all was observed: a number or a sign. */
export function hasObservation(readings: ObservedReadings): boolean {
  return readings.signs.length > 0 || Object.entries(readings).some(([name, value]) => name !== 'signs' && value !== null)
}

/** A stop rule as judged by the observations so far. Times in UTC milliseconds; see lib/weaning/stop/observation.ts. */
export type JudgedRuleDto = {
  id: string
  /** The rule in plain words, with its unit. */
  words: string
  source: string
  state: StopState
  /** First look of the run beyond the limit: the one that met the rule, or the one that still runs. */
  sinceMs: number | null
  metAtMs: number | null
  /** near only: when it would be met if a look then is still beyond the limit. */
  reachedAtMs: number | null
  isBeyondNow: boolean
  lastValue: number | null
}

/** A rule or sign that an ended hold or trial names, in words. */
export type NamedRuleDto = { id: string; words: string }
