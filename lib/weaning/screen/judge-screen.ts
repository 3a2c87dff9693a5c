import { ageReason, unknownReading } from '@/lib/weaning/answer'
import { meetsLimit } from '@/lib/weaning/compare/meets-limit'
import type { ScreenRule } from '@/lib/weaning/protocol'
import type { ScreenReadings, UnknownReason } from '@/lib/weaning/readings'
import type { CriterionMark } from '@/lib/weaning/vocabulary'
import { criterionValue, type CriterionValue } from './criterion-value'
import type { CriterionVerdict, ScreenVerdict } from './verdict'

/** Version of the way in which screens are judged; raised whenever the same readings could get another verdict. */
export const SCREEN_RULE_SET = 'screen-1'

/**
 * Judges a daily screen by a protocol's criteria. Any criterion not met: not ready. Otherwise any not assessed: incomplete.
 * Only all met is ready, and a protocol without criteria is never ready. Under 18 or with unknown age no criterion is computed.
 * Variant: every criterion switched on must be met. Source: each rule carries its own.
 * @example judgeScreen(defaultProtocol.screen, readings, true).result // 'ready'
 */
export function judgeScreen(rules: readonly ScreenRule[], readings: ScreenReadings, isAdult: boolean | null): ScreenVerdict {
  const age = ageReason(isAdult)
  const criteria = rules.map((rule) => judgeCriterion(rule, readings, age))
  return { result: resultOf(criteria), criteria, ruleSet: SCREEN_RULE_SET }
}

function resultOf(criteria: CriterionVerdict[]): ScreenVerdict['result'] {
  if (criteria.some(({ mark }) => mark === 'not_met')) return 'not_ready'
  const isComplete = criteria.length > 0 && criteria.every(({ mark }) => mark === 'met')
  return isComplete ? 'ready' : 'incomplete'
}

function judgeCriterion(rule: ScreenRule, readings: ScreenReadings, age: UnknownReason | null): CriterionVerdict {
  const { criterion } = rule
  const answer = age === null ? criterionValue(criterion, readings) : unknownReading(age)
  if (!answer.known) return { criterion, mark: 'not_assessed', value: null, unknownBecause: answer.reason }
  return { criterion, mark: markOf(rule, answer), value: answer.value, unknownBecause: null }
}

function markOf(rule: ScreenRule, { value }: Extract<CriterionValue, { known: true }>): CriterionMark {
  switch (rule.kind) {
    case 'number': {
      const isMet = typeof value === 'number' && rule.limits.length > 0 && rule.limits.every((limit) => meetsLimit(value, limit))
      return isMet ? 'met' : 'not_met'
    }
    case 'yesNo':
      return value === rule.expect ? 'met' : 'not_met'
    case 'word':
      return rule.accept.some((word) => word === value) ? 'met' : 'not_met'
  }
}
