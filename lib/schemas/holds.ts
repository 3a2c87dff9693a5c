import { z } from 'zod'
import type { ObservedReadings } from '@/lib/weaning/readings'
import {
  HOLD_OUTCOMES,
  HOLD_SAFETY_ITEMS,
  HOLD_STARTS,
  type HoldOutcome,
  type HoldSafetyItem,
  type HoldStart,
  type ScreenResult,
} from '@/lib/weaning/vocabulary'
import { hasObservation, observedReadingsSchema, type JudgedRuleDto, type NamedRuleDto } from './observation'
import { entryInput, type EntryDto } from './observed'
import { askSecondLook } from './reading'
import { seenInput, type StepFormDto } from './step-form'

export const INFUSION_UNITS = ['mL/h', 'mg/h', 'mg/kg/h', 'µg/h', 'µg/kg/h', 'µg/kg/min'] as const
export type InfusionUnit = (typeof INFUSION_UNITS)[number]
export const INFUSION_PURPOSES = ['sedation', 'pain'] as const

/** A continuous infusion as it ran just before the hold. */
export const infusionSchema = z.object({
  drug: z.string().trim().min(2, 'Give the drug.').max(60, 'Keep the drug’s name under 60 characters.'),
  rate: z
    .number({ error: 'Give the rate as a number.' })
    .positive('The rate is above 0; leave out what is not running.')
    .max(1000, 'The rate is at most 1000. Check the unit.'),
  unit: z.enum(INFUSION_UNITS, { error: 'Choose the unit of the rate.' }),
  purpose: z.enum(INFUSION_PURPOSES, { error: 'Say whether it is given for sedation or for pain.' }),
})

const note = z.string().trim().max(1000, 'Keep the note under 1000 characters.').nullable()

/** The answer of the safety screen: not needed, unsafe (which items), or started. true means the item is present. */
export const startHoldSchema = z
  .object({
    ...entryInput,
    ...seenInput,
    start: z.enum(HOLD_STARTS, { error: 'Choose: not needed, unsafe, or start the hold.' }),
    safety: z.partialRecord(z.enum(HOLD_SAFETY_ITEMS), z.boolean()).nullable(),
    infusions: z.array(infusionSchema).max(12, 'At most 12 infusions.'),
    note,
  })
  .superRefine((input, issues) => {
    const present = HOLD_SAFETY_ITEMS.filter((item) => input.safety?.[item] === true)
    const hasSedation = input.infusions.some((infusion) => infusion.purpose === 'sedation')
    const refuse = (path: string[], message: string) => issues.addIssue({ code: 'custom', path, message })
    if (input.start === 'not_needed' && hasSedation) {
      refuse(
        ['infusions'],
        'A sedative infusion is listed, so a hold is not “not needed”. Start the hold, or say what makes it unsafe.',
      )
    }
    if (input.start === 'unsafe' && present.length === 0) refuse(['safety'], 'Say which safety item is present.')
    if (input.start === 'started' && !hasSedation)
      refuse(['infusions'], 'List the sedative infusion that is being stopped, with its rate.')
    if (input.start === 'started') {
      for (const item of present) refuse(['safety', item], 'With this present the hold is unsafe. Record it as unsafe instead.')
    }
  })
export type StartHoldInput = z.output<typeof startHoldSchema>

/** holdId is the hold's entryId, which all its versions share. */
export const observeHoldSchema = z
  .object({
    ...entryInput,
    holdId: z.string().min(1),
    readings: observedReadingsSchema,
    opensEyesToVoice: z.enum(['yes', 'no']).nullable(),
  })
  .superRefine((input, issues) => {
    if (hasObservation(input.readings) || input.opensEyesToVoice !== null) return
    issues.addIssue({ code: 'custom', path: ['readings'], message: 'Give at least one reading, sign or answer.' })
  })
  .superRefine(askSecondLook)
export type ObserveHoldInput = z.output<typeof observeHoldSchema>

/** The end of a hold. rulesMet names rules beyond those that the observations already meet. Restart rates are computed by the server. */
export const endHoldSchema = z
  .object({
    ...entryInput,
    holdId: z.string().min(1),
    outcome: z.enum(HOLD_OUTCOMES, { error: 'Choose the outcome.' }),
    rulesMet: z.array(z.string().min(1)).max(40),
    note,
  })
  .superRefine((input, issues) => {
    if (input.outcome !== 'stopped' || (input.note ?? '').length >= 3) return
    issues.addIssue({ code: 'custom', path: ['note'], message: 'Say why the hold was stopped.' })
  })
export type EndHoldInput = z.output<typeof endHoldSchema>

/** What half (the protocol's fraction) of the rate before the hold comes to. Information for the prescriber, not an order. */
export type RestartDto = { drug: string; unit: string; rateBefore: number; rate: number }
/** What recording answers. rulesMet: ids of the fail rules met after this observation. */
export type StartedHoldDto = { id: string; holdId: string; start: HoldStart }
export type ObservedHoldDto = { id: string; rulesMet: string[] }
export type EndedHoldDto = { id: string; outcome: HoldOutcome; restarts: RestartDto[] }

/** As recorded; the form offers INFUSION_UNITS. */
export type InfusionDto = { drug: string; rate: number; unit: string; purpose: (typeof INFUSION_PURPOSES)[number] }
export type HoldObservationDto = EntryDto & { readings: ObservedReadings; opensEyesToVoice: 'yes' | 'no' | null }
export type HoldEndDto = EntryDto & {
  outcome: HoldOutcome
  rulesMet: NamedRuleDto[]
  restarts: RestartDto[]
  note: string | null
}

export type HoldDto = EntryDto & {
  start: HoldStart
  safety: Partial<Record<HoldSafetyItem, boolean>> | null
  infusions: InfusionDto[]
  note: string | null
  /** By time observed. */
  observations: HoldObservationDto[]
  end: HoldEndDto | null
  /** Fail rules as the observations stand; empty when the hold was not started. */
  rules: JudgedRuleDto[]
}

/** A running hold, with what its page counts towards. Times in UTC milliseconds. */
export type RunningHoldDto = HoldDto & {
  nextObservationDueMs: number
  /** When it counts as tolerated by duration alone, if no rule is met until then. */
  toleratedByTimeAtMs: number
  /** null: nobody recorded whether the eyes open to voice. */
  eyesOpenedAtMs: number | null
  isTolerated: boolean
  restartFraction: number
  restartsIfNotTolerated: RestartDto[]
}

export type HoldFormDto = StepFormDto & {
  latestScreen: { result: ScreenResult; observedAt: number; recordedByName: string } | null
  /** Today's holds, latest first; a running one is not among them. */
  holds: HoldDto[]
  running: RunningHoldDto | null
  /** From the last hold on record, to be confirmed. */
  lastInfusions: { observedAt: number; infusions: InfusionDto[] } | null
  amending:
    | { kind: 'start'; hold: HoldDto }
    | { kind: 'observation'; observation: HoldObservationDto; holdId: string }
    | { kind: 'end'; end: HoldEndDto; holdId: string }
    | null
  may: { start: boolean; observe: boolean; end: boolean }
}
