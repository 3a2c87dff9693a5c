import type { DayClock, DayDecision, NextMove } from '@/lib/weaning/day-record'
import type { ProtocolContent } from '@/lib/weaning/protocol'
import { MINUTE_MS, noMove, owed } from './owed'

/** The move that a signed decision leaves: the extubation, another look the same day, or none today. */
export function decisionMove(decision: DayDecision, protocol: ProtocolContent, clock: DayClock): NextMove {
  const { signedMs, choice, lookAgainMs } = decision
  switch (choice) {
    case 'extubate':
    case 'comfort_extubation': {
      const dueMs = signedMs + protocol.decision.extubateWithinMin * MINUTE_MS
      return owed(clock, 'extubate', { sinceMs: signedMs, dueMs }, { code: 'decision_signed', atMs: signedMs, choice })
    }
    case 'not_today':
      if (lookAgainMs === null || lookAgainMs >= clock.dayEndsMs) return noMove({ code: 'look_again_later', atMs: lookAgainMs })
      return owed(clock, 'decide_again', { sinceMs: signedMs, dueMs: lookAgainMs }, { code: 'look_again', atMs: lookAgainMs })
    case 'tracheostomy_pathway':
      return noMove({ code: 'tracheostomy_pathway' })
  }
}
