import { z } from 'zod'
import { SEXES, type Airway, type Sex, type StayEnd } from '@/lib/weaning/vocabulary'
import { observedSchema } from './observed'
import { askSecondLook, optionalReading } from './reading'

const name = (what: string) =>
  z
    .string({ error: `Give the ${what}.` })
    .trim()
    .min(1, `Give the ${what}.`)
    .max(80, `The ${what} has at most 80 characters.`)

const EARLIEST_BIRTH = '1900-01-01'

const birthDate = z
  .string({ error: 'Give the date of birth, or leave it empty when it is not known.' })
  .regex(/^\d{4}-\d{2}-\d{2}$/, 'Give the date of birth as year-month-day, such as 1961-05-20.')
  .refine((day) => isCalendarDay(day), 'This day does not exist. Give the date of birth as year-month-day, such as 1961-05-20.')
  .refine((day) => day >= EARLIEST_BIRTH, 'This date of birth is too long ago. Look at the year.')
  .nullable()

function isCalendarDay(day: string): boolean {
  const date = new Date(`${day}T00:00:00Z`)
  return !Number.isNaN(date.getTime()) && date.toISOString().slice(0, 10) === day
}

/** The hospital's number of a patient, in capitals, so that one written in small letters is the same. */
export const recordNumberSchema = z
  .string({ error: 'Give the record number.' })
  .trim()
  .min(1, 'Give the record number.')
  .max(40, 'A record number has at most 40 characters.')
  .transform((text) => text.replace(/\s+/g, ' ').toUpperCase())

/** Who the patient is. What is not known is null; then nothing is computed that needs it. */
const patientInput = {
  recordNumber: recordNumberSchema,
  familyName: name('family name'),
  givenName: name('given name'),
  birthDate,
  sex: z.enum(SEXES, { error: 'Choose the sex, or leave it open when it is not known.' }).nullable(),
  heightCm: optionalReading('heightCm'),
  weightKg: optionalReading('weightKg'),
  confirmedUnlikely: z.array(z.string().max(80)).max(60).optional(),
}

export const admitPatientSchema = z
  .object({
    unitId: z.string().min(1),
    bedId: z.string({ error: 'Choose the bed.' }).min(1, 'Choose the bed.'),
    observed: observedSchema,
    ...patientInput,
  })
  .superRefine(askSecondLook)
export type AdmitPatientInput = z.output<typeof admitPatientSchema>
export type AdmittedDto = { patientId: string; stayId: string; isReadmission: boolean }

export const correctPatientSchema = z
  .object({ patientId: z.string().min(1), version: z.number().int(), ...patientInput })
  .superRefine(askSecondLook)
export type CorrectPatientInput = z.output<typeof correctPatientSchema>

export const listPatientsSchema = z.object({ unitId: z.string().min(1) })
/** `episodeId` asks for an earlier episode; without it the open one is read, else the last. */
export const readPatientSchema = z.object({ patientId: z.string().min(1), episodeId: z.string().min(1).optional() })

export type UnitPatientDto = {
  patientId: string
  bedLabel: string
  bedOrder: number
  recordNumber: string
  familyName: string
  givenName: string
  ageYears: number | null
  sex: Sex | null
  admittedAt: number
  /** The open episode; null when the patient is not ventilated. */
  episode: { id: string; startedAt: number; airway: Airway; ventilatorDayNumber: number } | null
  /** When ventilation last ended here, whenever that was; null when it never did. */
  lastEndedAt: number | null
}
/** All patients now in the unit, in bed order, and its free beds. */
export type PatientListDto = {
  unit: { id: string; name: string; timeZone: string }
  nowMs: number
  patients: UnitPatientDto[]
  freeBeds: { id: string; label: string }[]
  mayAdmit: boolean
}

export type PatientHeadDto = {
  id: string
  recordNumber: string
  familyName: string
  givenName: string
  birthDate: string | null
  ageYears: number | null
  /** null when the age is not known. Indices and criteria are computed for adults only. */
  isAdult: boolean | null
  sex: Sex | null
  heightCm: number | null
  weightKg: number | null
  version: number
  /** Of heightCm and weightKg, those that were kept after a second look. */
  unlikely: string[]
}

export type StayDto = {
  id: string
  bedId: string
  bedLabel: string
  startedAt: number
  endedAt: number | null
  end: StayEnd | null
}

/** What the page lets the reader do; the verbs check again. */
export const PATIENT_ACTIONS = [
  'patient.correct',
  'stay.move',
  'stay.end',
  'episode.begin',
  'episode.end',
  'airway.record',
  'settings.record',
  'gas.record',
  'screen.record',
  'hold.start',
  'hold.observe',
  'hold.end',
  'trial.start',
  'trial.observe',
  'trial.end',
  'decision.sign',
] as const
export type PatientActions = Record<(typeof PATIENT_ACTIONS)[number], boolean>
