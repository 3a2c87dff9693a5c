import { z } from 'zod'
import type { NextMove } from '@/lib/weaning/day-record'
import type { ProtocolContent } from '@/lib/weaning/protocol'
import type { Airway, Sex, VentilatorMode } from '@/lib/weaning/vocabulary'
import type { ObservedInput } from './observed'

/** What a step's page asks for: the episode, and the version to correct when it was opened to correct one. */
export const stepFormQuerySchema = z.object({ episodeId: z.string().min(1), amend: z.string().min(1).optional() })
export type StepFormQuery = z.output<typeof stepFormQuerySchema>

/**
 * Sent with every new screen, hold, trial and decision: the newest entry of its kind that the form showed, null when there was none. When
 * another was recorded meanwhile the answer is CONFLICT and says who, when and what; `recordAnyway` records this one as well.
 */
export const seenInput = {
  seenLatestId: z.string().min(1).nullable(),
  recordAnyway: z.boolean().optional(),
}

/** Who the form is about. */
export type PatientLineDto = {
  patientId: string
  episodeId: string
  unitId: string
  unitName: string
  timeZone: string
  bedLabel: string
  familyName: string
  givenName: string
  sex: Sex | null
  ageYears: number | null
  /** null when the birth date is unknown: then criteria and indices are not computed. */
  isAdult: boolean | null
  heightCm: number | null
  weightKg: number | null
  predictedBodyWeightKg: number | null
  ventilatorDayNumber: number
  airway: Airway
  episodeStartedAt: number
  episodeEndedAt: number | null
}

/** The protocol version that judges what this form records: the running step's or corrected entry's own version, else the one in force now. */
export type FormProtocolDto = {
  id: string
  number: number
  isDefault: boolean
  startsAt: number | null
  content: ProtocolContent
}

/** Last known values with their time, to be confirmed with one tap. Times in UTC milliseconds. */
export type PrefillDto = {
  settings: {
    observedAt: number
    mode: VentilatorMode
    fio2Fraction: number
    peepCmH2O: number
    pressureSupportCmH2O: number | null
    measuredRatePerMin: number | null
    measuredTidalVolumeMl: number | null
    spo2Percent: number | null
  } | null
  gas: {
    observedAt: number
    ph: number
    paCO2MmHg: number
    paO2MmHg: number
    fio2Fraction: number
    haemoglobinGPerDl: number | null
  } | null
}

/** What the page of every step needs. */
export type StepFormDto = {
  patient: PatientLineDto
  protocol: FormProtocolDto
  prefill: PrefillDto
  move: NextMove
  /** The server's clock, UTC milliseconds, and what the unit's wall clock shows at it. */
  nowMs: number
  wallClock: ObservedInput
  ventilatorDay: string
  /** The newest entry of this kind on record: send it back as seenLatestId. */
  seenLatestId: string | null
}
