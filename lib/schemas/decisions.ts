import { z } from 'zod'
import type { Reading } from '@/lib/weaning/readings'
import {
  DECISION_CHOICES,
  NOT_TODAY_REASONS,
  SUPPORTS_AFTER,
  type Cough,
  type DecisionChoice,
  type NotTodayReason,
  type Secretions,
  type SupportAfter,
} from '@/lib/weaning/vocabulary'
import type { HoldDto } from './holds'
import { amendsSchema, observedSchema, type EntryDto } from './observed'
import type { ScreenDto } from './screens'
import { seenInput, type PrefillDto, type StepFormDto } from './step-form'
import type { TrialDto } from './trials'

/**
 * A signed decision. It is observed at the moment of signing. seenEvidenceHash names the evidence that stood on the page: when the record
 * has changed since, nothing is signed. The password is checked and never kept.
 */
export const signDecisionSchema = z
  .object({
    episodeId: z.string().min(1),
    amends: amendsSchema,
    ...seenInput,
    seenEvidenceHash: z.string().min(1),
    choice: z.enum(DECISION_CHOICES, { error: 'Choose a decision. None is chosen beforehand.' }),
    reasons: z.array(z.enum(NOT_TODAY_REASONS)).max(NOT_TODAY_REASONS.length),
    lookAgain: observedSchema.nullable(),
    supportAfter: z.enum(SUPPORTS_AFTER).nullable(),
    steroidsPlanned: z.boolean().nullable(),
    note: z.string().trim().max(2000, 'Keep the note under 2000 characters.').nullable(),
    password: z.string({ error: 'Give your password to sign.' }).min(1, 'Give your password to sign.').max(256),
  })
  .superRefine((input, issues) => {
    const refuse = (path: string[], message: string) => issues.addIssue({ code: 'custom', path, message })
    if (input.choice === 'not_today') {
      if (input.reasons.length === 0) refuse(['reasons'], 'Give at least one reason.')
      if (input.lookAgain === null) refuse(['lookAgain'], 'Say when to look again.')
      if (input.reasons.includes('other') && (input.note ?? '').length < 3)
        refuse(['note'], 'Say the other reason in a few words.')
    } else {
      if (input.reasons.length > 0) refuse(['reasons'], 'Reasons belong to “not today”. Clear them, or choose “not today”.')
      if (input.lookAgain !== null)
        refuse(['lookAgain'], 'A time to look again belongs to “not today”. Clear it, or choose “not today”.')
    }
    if (input.choice === 'extubate' && input.supportAfter === null)
      refuse(['supportAfter'], 'Choose the support planned after extubation.')
    if (input.choice === 'not_today' && (input.supportAfter !== null || input.steroidsPlanned !== null)) {
      refuse(['supportAfter'], 'Support after extubation does not belong to “not today”. Clear it.')
    }
  })
export type SignDecisionInput = z.output<typeof signDecisionSchema>

/** What the record holds for the decision. Gathered by the server; kept with the signature. Times in UTC milliseconds. */
export type DecisionEvidence = {
  ventilatorDay: string
  screen: ScreenDto | null
  hold: HoldDto | null
  trial: TrialDto | null
  /** The latest RSBI of today: from the trial's last observation with rate and volume, else its baseline, else the screen. */
  rsbi: { value: Reading; from: 'trial' | 'baseline' | 'screen'; observedAt: number } | null
  settings: PrefillDto['settings']
  gas: PrefillDto['gas']
  cough: Cough | null
  secretions: Secretions | null
}

/** What nobody has recorded; it is named, and never counts in favour. */
export const EVIDENCE_ITEMS = ['screen', 'hold', 'trial', 'rsbi', 'settings', 'gas', 'cough', 'secretions'] as const
export type EvidenceItem = (typeof EVIDENCE_ITEMS)[number]

/** What signing answers. */
export type SignedDecisionDto = { id: string; choice: DecisionChoice; statement: string; contentHash: string }

export type DecisionDto = EntryDto & {
  choice: DecisionChoice
  reasons: NotTodayReason[]
  lookAgainAt: number | null
  supportAfter: SupportAfter | null
  steroidsPlanned: boolean | null
  note: string | null
  statement: string
  contentHash: string
}

export type DecisionFormDto = StepFormDto & {
  evidence: DecisionEvidence
  evidenceHash: string
  missing: EvidenceItem[]
  /** A trial runs at the moment: its end comes before a decision to extubate. */
  isTrialRunning: boolean
  /** Today's decisions, latest first. */
  decisions: DecisionDto[]
  amending: DecisionDto | null
  signerName: string
  may: { sign: boolean }
}
