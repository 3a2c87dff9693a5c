import type { JudgedRuleDto, NamedRuleDto } from '@/lib/schemas/observation'
import { invalidField } from '@/lib/shared/errors'
import type { StopRule } from '@/lib/weaning/protocol'
import type { ObservedReadings } from '@/lib/weaning/readings'
import { describeRule } from '@/lib/weaning/stop/describe-rule'
import { judgeStop } from '@/lib/weaning/stop/judge-stop'
import { rulesMet } from '@/lib/weaning/stop/rules-met'

type Look = { row: { observedAt: number; readings: ObservedReadings } }

const toObservations = (looks: readonly Look[]) => looks.map(({ row }) => ({ atMs: row.observedAt, readings: row.readings }))

/** Every rule as the looks up to a moment judge it, in words. */
export function judgeRules(
  rules: readonly StopRule[],
  baseline: ObservedReadings | null,
  looks: readonly Look[],
  now: number,
): JudgedRuleDto[] {
  return judgeStop(rules, baseline, toObservations(looks), now).map((verdict) => ({
    id: verdict.ruleId,
    words: describeRule(verdict.rule),
    source: verdict.rule.source,
    state: verdict.state,
    sinceMs: verdict.sinceMs,
    metAtMs: verdict.metAtMs,
    reachedAtMs: verdict.reachedAtMs,
    isBeyondNow: verdict.isBeyondNow,
    lastValue: verdict.lastValue,
  }))
}

/** Ids of the rules that the looks up to a moment meet. */
export function idsOfRulesMet(
  rules: readonly StopRule[],
  baseline: ObservedReadings | null,
  looks: readonly Look[],
  at: number,
): string[] {
  return rulesMet(judgeStop(rules, baseline, toObservations(looks), at)).ids
}

/** The rules met by the looks together with those that a person names. A name that the protocol does not know is refused at its field. */
export function joinNamedRules(rules: readonly StopRule[], met: readonly string[], named: readonly string[]): string[] {
  const unknown = named.find((id) => !rules.some((rule) => rule.id === id))
  if (unknown !== undefined)
    throw invalidField('rulesMet', 'One of the chosen rules is not in the protocol that judges this entry. Reload the page.')
  return rules.map((rule) => rule.id).filter((id) => met.includes(id) || named.includes(id))
}

/** Recorded rule ids in words. */
export function nameRules(rules: readonly StopRule[], ids: readonly string[]): NamedRuleDto[] {
  return ids.map((id) => {
    const rule = rules.find((candidate) => candidate.id === id)
    return { id, words: rule ? describeRule(rule) : 'a rule that this protocol version does not list' }
  })
}
