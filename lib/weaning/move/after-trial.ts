import type { DayClock, NextMove } from '@/lib/weaning/day-record'
import type { ProtocolContent } from '@/lib/weaning/protocol'
import type { EndedTrial } from './day-entries'
import { MINUTE_MS, noMove, owed } from './owed'
import { ruleWords } from './rule-words'

/** The move that an ended trial leads to: the decision on a passed one, a new start of a stopped one, none today after a failed one. */
export function afterTrial(trial: EndedTrial, protocol: ProtocolContent, clock: DayClock): NextMove {
  const { endedMs, stopRulesMet } = trial
  switch (trial.outcome) {
    case 'passed': {
      const dueMs = endedMs + protocol.decision.answerWithinMin * MINUTE_MS
      return owed(clock, 'decide', { sinceMs: endedMs, dueMs }, { code: 'trial_passed', atMs: endedMs })
    }
    case 'stopped': {
      const dueMs = endedMs + protocol.trial.retryWithinMin * MINUTE_MS
      return owed(clock, 'start_trial', { sinceMs: endedMs, dueMs }, { code: 'trial_was_stopped', atMs: endedMs })
    }
    case 'failed':
      return noMove({
        code: 'trial_failed',
        atMs: endedMs,
        rules: stopRulesMet,
        ruleWords: ruleWords(stopRulesMet, protocol.trial.stopRules),
      })
  }
}
