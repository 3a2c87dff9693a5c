import type { DayClock, DayHold, NextMove } from '@/lib/weaning/day-record'
import type { ProtocolContent } from '@/lib/weaning/protocol'
import { MINUTE_MS, owed } from './owed'
import { ruleWords } from './rule-words'

/**
 * The move that a running hold owes: its outcome once a fail rule is met, the eyes open to voice or it has lasted long enough, else the
 * next look. After the eyes opened, the outcome is due by the time of the next look.
 */
export function holdMove(hold: DayHold, protocol: ProtocolContent, clock: DayClock): NextMove {
  const { startedMs, lastObservedMs, failRulesMet } = hold
  const { observeEveryMin, toleratedAfterMin, failRules } = protocol.hold
  if (failRulesMet.length > 0) {
    const metMs = hold.failRulesMetMs ?? lastObservedMs ?? startedMs
    const why = { code: 'hold_limit_met', rules: failRulesMet, ruleWords: ruleWords(failRulesMet, failRules) } as const
    return owed(clock, 'end_hold', { sinceMs: metMs, dueMs: metMs }, why)
  }
  const longEnoughMs = startedMs + toleratedAfterMin * MINUTE_MS
  if (hold.opensEyesMs !== null) {
    const dueMs = Math.min(hold.opensEyesMs + observeEveryMin * MINUTE_MS, longEnoughMs)
    return owed(clock, 'end_hold', { sinceMs: hold.opensEyesMs, dueMs }, { code: 'hold_eyes_open', atMs: hold.opensEyesMs })
  }
  if (clock.nowMs >= longEnoughMs) {
    return owed(
      clock,
      'end_hold',
      { sinceMs: startedMs, dueMs: longEnoughMs },
      { code: 'hold_long_enough', sinceMs: longEnoughMs },
    )
  }
  const lastMs = lastObservedMs ?? startedMs
  const dueMs = Math.min(lastMs + observeEveryMin * MINUTE_MS, longEnoughMs)
  return owed(clock, 'observe_hold', { sinceMs: lastMs, dueMs }, { code: 'hold_running', startedMs, lastObservedMs })
}
