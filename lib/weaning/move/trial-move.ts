import type { DayClock, DayTrial, NextMove } from '@/lib/weaning/day-record'
import type { ProtocolContent } from '@/lib/weaning/protocol'
import { nextObservation } from '@/lib/weaning/stop/next-observation'
import { MINUTE_MS, owed } from './owed'
import { ruleWords } from './rule-words'

/** The move that a running trial owes: its outcome once a stop rule is met or its planned end has passed, else the next look. */
export function trialMove(trial: DayTrial, protocol: ProtocolContent, clock: DayClock): NextMove {
  const { startedMs, observedMs, stopRulesMet } = trial
  if (stopRulesMet.length > 0) {
    const metMs = trial.stopRulesMetMs ?? Math.max(startedMs, ...observedMs)
    const why = {
      code: 'trial_limit_met',
      rules: stopRulesMet,
      ruleWords: ruleWords(stopRulesMet, protocol.trial.stopRules),
    } as const
    return owed(clock, 'end_trial', { sinceMs: metMs, dueMs: metMs }, why)
  }
  const next = nextObservation({ ...trial, observationMinutes: protocol.trial.observationMinutes })
  const endMs = startedMs + trial.plannedDurationMin * MINUTE_MS
  if (next === null || clock.nowMs >= endMs) {
    const why = { code: 'trial_planned_end', atMs: endMs, isLastLookMissing: next !== null } as const
    return owed(clock, 'end_trial', { sinceMs: startedMs, dueMs: endMs }, why)
  }
  const sinceMs = Math.max(startedMs, ...observedMs)
  return owed(clock, 'observe_trial', { sinceMs, dueMs: next.dueMs }, { code: 'trial_observation', minute: next.minute })
}
