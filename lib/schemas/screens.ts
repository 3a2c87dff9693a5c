import { z } from 'zod'
import type { ScreenReadings } from '@/lib/weaning/readings'
import type { ScreenVerdict } from '@/lib/weaning/screen/verdict'
import {
  COUGHS,
  EXCUSE_REASONS,
  RSBI_CONDITIONS,
  SECRETIONS,
  type ExcuseReason,
  type ScreenResult,
} from '@/lib/weaning/vocabulary'
import { entryInput, type EntryDto } from './observed'
import { askSecondLook, optionalReading } from './reading'
import { seenInput, type StepFormDto } from './step-form'

const answer = z.boolean({ error: 'Answer yes or no, or leave it not assessed.' }).nullable()

/** Every reading may be null: not assessed. */
export const screenReadingsSchema = z
  .object({
    fio2Fraction: optionalReading('fio2Fraction'),
    peepCmH2O: optionalReading('peepCmH2O'),
    norepinephrineMcgPerKgMin: optionalReading('norepinephrineMcgPerKgMin'),
    otherVasopressor: answer,
    ischaemia: answer,
    spo2Percent: optionalReading('spo2Percent'),
    paO2MmHg: optionalReading('paO2MmHg'),
    paO2FiO2Fraction: optionalReading('paO2FiO2Fraction'),
    ph: optionalReading('ph'),
    spontaneousEffort: answer,
    cough: z.enum(COUGHS).nullable(),
    secretions: z.enum(SECRETIONS).nullable(),
    rass: optionalReading('rass'),
    raisedIcp: answer,
    neuromuscularBlockade: answer,
    temperatureC: optionalReading('temperatureC'),
    haemoglobinGPerDl: optionalReading('haemoglobinGPerDl'),
    causeImproving: answer,
    breathsPerMin: optionalReading('breathsPerMin'),
    tidalVolumeMl: optionalReading('tidalVolumeMl'),
    rsbiCondition: z.enum(RSBI_CONDITIONS).nullable(),
  })
  .superRefine((readings, issues) => {
    if (readings.breathsPerMin === null || readings.tidalVolumeMl === null || readings.rsbiCondition !== null) return
    issues.addIssue({
      code: 'custom',
      path: ['rsbiCondition'],
      message: 'Say how rate and volume were measured: values read lower on support.',
    })
  })

/** Whether anything was assessed; how the RSBI was measured is no reading by itself. */
export function hasScreenReading(readings: ScreenReadings): boolean {
  return Object.entries(readings).some(([name, value]) => name !== 'rsbiCondition' && value !== null)
}

/** A screen: readings to be judged, or a reason why there is none today. */
export const recordScreenSchema = z
  .object({
    ...entryInput,
    ...seenInput,
    excuse: z.enum(EXCUSE_REASONS).nullable(),
    note: z.string().trim().max(1000, 'Keep the note under 1000 characters.').nullable(),
    readings: screenReadingsSchema.nullable(),
  })
  .superRefine((input, issues) => {
    if (input.excuse === null && (input.readings === null || !hasScreenReading(input.readings))) {
      issues.addIssue({
        code: 'custom',
        path: ['readings'],
        message: 'Give at least one reading, or excuse the patient from today’s screen.',
      })
    }
    if (input.excuse === 'other' && (input.note ?? '').length < 3) {
      issues.addIssue({ code: 'custom', path: ['note'], message: 'Say in a few words why there is no screen today.' })
    }
  })
  .superRefine(askSecondLook)
export type RecordScreenInput = z.output<typeof recordScreenSchema>

/** What recording answers. */
export type RecordedScreenDto = { id: string; result: ScreenResult }

export type ScreenDto = EntryDto & {
  result: ScreenResult
  excuse: ExcuseReason | null
  note: string | null
  readings: ScreenReadings | null
  /** As judged when it was recorded; null for an excused screen. */
  verdict: ScreenVerdict | null
}

export type ScreenFormDto = StepFormDto & {
  /** Today's screens, latest first. */
  screens: ScreenDto[]
  /** The version to correct; its values fill the form. */
  amending: ScreenDto | null
  may: { record: boolean; amend: boolean }
}
