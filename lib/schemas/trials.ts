import { z } from 'zod'
import type { ObservedReadings } from '@/lib/weaning/readings'
import {
  BEDSIDE_SIGNS,
  TRIAL_OUTCOMES,
  TRIAL_TECHNIQUES,
  type HoldOutcome,
  type HoldStart,
  type ScreenResult,
  type TrialOutcome,
  type TrialTechnique,
} from '@/lib/weaning/vocabulary'
import {
  baselineReadingsSchema,
  hasObservation,
  observedReadingsSchema,
  type JudgedRuleDto,
  type NamedRuleDto,
} from './observation'
import { entryInput, type EntryDto } from './observed'
import { askSecondLook, optionalReading, requiredReading } from './reading'
import { seenInput, type StepFormDto } from './step-form'

type Numbers = { technique: TrialTechnique; pressureSupportCmH2O: number | null; peepCmH2O: number | null }

/** Which pressures a technique has: a T-piece none, CPAP a PEEP, pressure support both. */
function checkPressures({ technique, pressureSupportCmH2O, peepCmH2O }: Numbers, issues: z.RefinementCtx): void {
  const refuse = (field: string, message: string) => issues.addIssue({ code: 'custom', path: [field], message })
  if (technique === 't_piece') {
    if (pressureSupportCmH2O !== null) refuse('pressureSupportCmH2O', 'A T-piece gives no pressure support. Leave it empty.')
    if (peepCmH2O !== null) refuse('peepCmH2O', 'A T-piece gives no PEEP. Leave it empty.')
    return
  }
  if (peepCmH2O === null) refuse('peepCmH2O', 'Give the PEEP of the trial, in cmH2O; 0 when there is none.')
  if (technique === 'cpap' && pressureSupportCmH2O !== null)
    refuse('pressureSupportCmH2O', 'CPAP gives no pressure support. Leave it empty, or choose pressure support.')
  if (technique === 'pressure_support' && pressureSupportCmH2O === null)
    refuse('pressureSupportCmH2O', 'Give the pressure support of the trial, in cmH2O.')
}

export const startTrialSchema = z
  .object({
    ...entryInput,
    ...seenInput,
    technique: z.enum(TRIAL_TECHNIQUES, { error: 'Choose the technique.' }),
    pressureSupportCmH2O: optionalReading('pressureSupportCmH2O'),
    peepCmH2O: optionalReading('peepCmH2O'),
    fio2Fraction: requiredReading('fio2Fraction'),
    plannedDurationMin: z
      .number({ error: 'Give the planned length in minutes.' })
      .int('Give the planned length in whole minutes.')
      .positive('Give the planned length in minutes.'),
    baseline: baselineReadingsSchema,
    startedAnywayBecause: z.string().trim().min(3, 'Say in a few words why the trial starts now.').max(500).nullable(),
  })
  .superRefine(checkPressures)
  .superRefine(askSecondLook)
export type StartTrialInput = z.output<typeof startTrialSchema>

/** trialId is the trial's entryId, which all its versions share. */
export const observeTrialSchema = z
  .object({ ...entryInput, trialId: z.string().min(1), readings: observedReadingsSchema })
  .superRefine((input, issues) => {
    if (hasObservation(input.readings)) return
    issues.addIssue({ code: 'custom', path: ['readings'], message: 'Give at least one reading or sign.' })
  })
  .superRefine(askSecondLook)
export type ObserveTrialInput = z.output<typeof observeTrialSchema>

/** The end of a trial. rulesMet and signs name what ended it beyond the rules that the observations already meet. */
export const endTrialSchema = z
  .object({
    ...entryInput,
    trialId: z.string().min(1),
    outcome: z.enum(TRIAL_OUTCOMES, { error: 'Choose the outcome.' }),
    rulesMet: z.array(z.string().min(1)).max(40),
    signs: z.array(z.enum(BEDSIDE_SIGNS)).max(BEDSIDE_SIGNS.length),
    returnedTo: z.string().trim().max(200, 'Keep it under 200 characters.'),
    reason: z.string().trim().max(1000, 'Keep the reason under 1000 characters.').nullable(),
  })
  .superRefine((input, issues) => {
    const refuse = (path: string[], message: string) => issues.addIssue({ code: 'custom', path, message })
    if (input.outcome !== 'passed' && input.returnedTo.length < 2)
      refuse(['returnedTo'], 'Say what the patient went back to, such as the earlier mode and settings.')
    if (input.outcome === 'stopped' && (input.reason ?? '').length < 3) refuse(['reason'], 'Say why the trial was stopped.')
  })
export type EndTrialInput = z.output<typeof endTrialSchema>

/** What recording answers. rulesMet: ids of the stop rules met after this observation. */
export type StartedTrialDto = { id: string; trialId: string }
export type ObservedTrialDto = { id: string; rulesMet: string[] }
export type EndedTrialDto = { id: string; outcome: TrialOutcome }

export type TrialObservationDto = EntryDto & {
  readings: ObservedReadings
  /** Minutes after the start of the trial. */
  minute: number
  rsbi: number | null
}
export type TrialEndDto = EntryDto & {
  outcome: TrialOutcome
  rulesMet: NamedRuleDto[]
  returnedTo: string
  reason: string | null
}

export type TrialDto = EntryDto & {
  technique: TrialTechnique
  pressureSupportCmH2O: number | null
  peepCmH2O: number | null
  fio2Fraction: number
  plannedDurationMin: number
  baseline: ObservedReadings
  baselineRsbi: number | null
  startedAnywayBecause: string | null
  /** By time observed. */
  observations: TrialObservationDto[]
  end: TrialEndDto | null
  /** Stop rules as the observations stand. */
  rules: JudgedRuleDto[]
}

/** A running trial. Times in UTC milliseconds. */
export type RunningTrialDto = TrialDto & {
  plannedEndMs: number
  /** The next scheduled look that nobody has recorded yet; null after the last one. */
  nextObservation: { minute: number; dueMs: number } | null
}

/** Whether the day's record leads to a trial, and if not, what comes first, in words. */
export type TrialReadinessDto = {
  isInOrder: boolean
  missing: string[]
  screen: { result: ScreenResult; observedAt: number; recordedByName: string } | null
  hold: {
    start: HoldStart
    outcome: HoldOutcome | null
    observedAt: number
    endedAt: number | null
    recordedByName: string
  } | null
  /** Runs from the start of the hold; null without a hold that was started. */
  pairingWindowClosesMs: number | null
}

export type TrialFormDto = StepFormDto & {
  readiness: TrialReadinessDto
  /** Today's ended trials, latest first. */
  trials: TrialDto[]
  running: RunningTrialDto | null
  amending:
    | { kind: 'start'; trial: TrialDto }
    | { kind: 'observation'; observation: TrialObservationDto; trialId: string }
    | { kind: 'end'; end: TrialEndDto; trialId: string }
    | null
  may: { start: boolean; observe: boolean; end: boolean }
}
