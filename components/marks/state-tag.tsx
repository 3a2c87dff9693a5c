import { Tag } from '@/components/ui/tag'
import type { CriterionMark, HoldOutcome, HoldStart, ScreenResult, TrialOutcome } from '@/lib/weaning/vocabulary'
import { HOLD_OUTCOME_WORDS, HOLD_START_WORDS, MARK_WORDS, SCREEN_RESULT_WORDS, TRIAL_OUTCOME_WORDS } from '@/lib/weaning/words'
import { CRITERION_LOOK, HOLD_OUTCOME_LOOK, HOLD_START_LOOK, SCREEN_LOOK, TRIAL_OUTCOME_LOOK } from './looks'

type TagProps = { className?: string }

/** met, not met, not assessed. */
export function CriterionTag({ mark, className }: TagProps & { mark: CriterionMark }) {
  return (
    <Tag {...CRITERION_LOOK[mark]} className={className}>
      {MARK_WORDS[mark]}
    </Tag>
  )
}

/** ready, not ready, incomplete, excused. */
export function ScreenTag({ result, className }: TagProps & { result: ScreenResult }) {
  return (
    <Tag {...SCREEN_LOOK[result]} className={className}>
      {SCREEN_RESULT_WORDS[result]}
    </Tag>
  )
}

export function HoldStartTag({ start, className }: TagProps & { start: HoldStart }) {
  return (
    <Tag {...HOLD_START_LOOK[start]} className={className}>
      {HOLD_START_WORDS[start]}
    </Tag>
  )
}

export function HoldOutcomeTag({ outcome, className }: TagProps & { outcome: HoldOutcome }) {
  return (
    <Tag {...HOLD_OUTCOME_LOOK[outcome]} className={className}>
      {HOLD_OUTCOME_WORDS[outcome]}
    </Tag>
  )
}

export function TrialOutcomeTag({ outcome, className }: TagProps & { outcome: TrialOutcome }) {
  return (
    <Tag {...TRIAL_OUTCOME_LOOK[outcome]} className={className}>
      {TRIAL_OUTCOME_WORDS[outcome]}
    </Tag>
  )
}
