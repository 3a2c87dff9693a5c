import { changeFromBaseline } from '@/lib/weaning/compare/change-from-baseline'
import { meetsLimit } from '@/lib/weaning/compare/meets-limit'
import type { StopRule } from '@/lib/weaning/protocol'
import type { ObservedReadings } from '@/lib/weaning/readings'
import { observedValue } from './observed-value'

/** What one look says about one rule: the value, whether it is beyond the limit, and whether part of what it takes is there. */
export type RuleLook = { value: number; isBeyond: boolean; isPartly: boolean }

/**
 * What one look says about one rule, or null when it cannot judge it: the value was not observed, or there is no baseline to compare with.
 * @example lookByRule({ kind: 'sign', id: 'arrhythmia', sign: 'new_arrhythmia', source }, null, readings)?.isBeyond // true
 */
export function lookByRule(rule: StopRule, baseline: ObservedReadings | null, readings: ObservedReadings): RuleLook | null {
  switch (rule.kind) {
    case 'limit': {
      const answer = observedValue(rule.reading, readings)
      if (!answer.known) return null
      return { value: answer.value, isBeyond: meetsLimit(answer.value, rule.limit), isPartly: false }
    }
    case 'change':
      return lookByChange(rule, baseline, readings)
    case 'sign': {
      const isPresent = readings.signs.includes(rule.sign)
      return { value: isPresent ? 1 : 0, isBeyond: isPresent, isPartly: false }
    }
    case 'signs': {
      const count = countSigns(rule, readings)
      return { value: count, isBeyond: count >= rule.atLeast, isPartly: count > 0 && count < rule.atLeast }
    }
  }
}

function lookByChange(
  rule: Extract<StopRule, { kind: 'change' }>,
  baseline: ObservedReadings | null,
  readings: ObservedReadings,
): RuleLook | null {
  if (baseline === null) return null
  const before = observedValue(rule.reading, baseline)
  const now = observedValue(rule.reading, readings)
  if (!before.known || !now.known) return null
  const change = changeFromBaseline(before.value, now.value, rule)
  if (!change.known) return null
  const isBeyond = meetsLimit(change.value, { comparator: rule.comparator, value: rule.by })
  return { value: change.value, isBeyond, isPartly: false }
}

/** Signs present at this one look, each once, and each reading beyond its limit as one sign more. */
function countSigns(rule: Extract<StopRule, { kind: 'signs' }>, readings: ObservedReadings): number {
  const signs = new Set(rule.signs.filter((sign) => readings.signs.includes(sign))).size
  const limits = rule.limits.filter(({ reading, limit }) => {
    const answer = observedValue(reading, readings)
    return answer.known && meetsLimit(answer.value, limit)
  })
  return signs + limits.length
}
