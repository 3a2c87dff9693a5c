import type { UnknownReason } from '@/lib/weaning/readings'
import type { CriterionMark, ScreenCriterion, ScreenResult } from '@/lib/weaning/vocabulary'

/** One criterion as judged. The limit and its source stand in the protocol version that the entry names. */
export type CriterionVerdict = {
  criterion: ScreenCriterion
  mark: CriterionMark
  /** The value compared, never rounded; null when not assessed. */
  value: number | string | boolean | null
  /** Why it could not be assessed, when it could not. */
  unknownBecause: UnknownReason | null
}

/** Judged by one protocol version; ruleSet names the version of this code's rules. */
export type ScreenVerdict = {
  result: Exclude<ScreenResult, 'excused'>
  criteria: CriterionVerdict[]
  ruleSet: string
}
