import type { MarkShape } from '@/components/ui/mark'
import type { Tone } from '@/components/ui/tag'
import type { CriterionMark, DecisionChoice, HoldOutcome, HoldStart, ScreenResult, TrialOutcome } from '@/lib/weaning/vocabulary'

/** The mark and tone of a state; its word stands in lib/weaning/words. Every state of a list has a shape of its own. */
export type Look = { shape: MarkShape; tone: Tone }

export const CRITERION_LOOK: Record<CriterionMark, Look> = {
  met: { shape: 'tick', tone: 'calm' },
  not_met: { shape: 'cross', tone: 'stop' },
  not_assessed: { shape: 'ring', tone: 'wait' },
}
export const SCREEN_LOOK: Record<ScreenResult, Look> = {
  ready: { shape: 'tick', tone: 'calm' },
  not_ready: { shape: 'cross', tone: 'stop' },
  incomplete: { shape: 'ring', tone: 'wait' },
  excused: { shape: 'dash', tone: 'muted' },
}
export const HOLD_START_LOOK: Record<HoldStart, Look> = {
  started: { shape: 'hatch', tone: 'wait' },
  not_needed: { shape: 'dash', tone: 'muted' },
  unsafe: { shape: 'diamond', tone: 'stop' },
}
export const HOLD_OUTCOME_LOOK: Record<HoldOutcome, Look> = {
  tolerated: { shape: 'tick', tone: 'calm' },
  not_tolerated: { shape: 'cross', tone: 'stop' },
  stopped: { shape: 'square', tone: 'wait' },
}
export const TRIAL_OUTCOME_LOOK: Record<TrialOutcome, Look> = {
  passed: { shape: 'tick', tone: 'calm' },
  failed: { shape: 'cross', tone: 'stop' },
  stopped: { shape: 'square', tone: 'wait' },
}
export const DECISION_LOOK: Record<DecisionChoice, Look> = {
  extubate: { shape: 'flag', tone: 'ink' },
  comfort_extubation: { shape: 'flag', tone: 'ink' },
  not_today: { shape: 'flagOpen', tone: 'ink' },
  tracheostomy_pathway: { shape: 'flagOpen', tone: 'ink' },
}
