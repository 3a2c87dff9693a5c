import type { StopRule } from '@/lib/weaning/protocol'
import { describeRule } from '@/lib/weaning/stop/describe-rule'

/**
 * Rules met, in words. A rule that the protocol in force no longer has is named as that.
 * @example ruleWords(['breaths_high'], protocol.trial.stopRules) // ['respiratory rate above 35 /min for 5 min']
 */
export function ruleWords(ids: readonly string[], rules: readonly StopRule[]): string[] {
  return ids.map((id) => {
    const rule = rules.find((candidate) => candidate.id === id)
    return rule ? describeRule(rule) : 'a rule of an earlier protocol version'
  })
}
