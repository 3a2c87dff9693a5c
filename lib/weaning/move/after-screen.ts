import type { DayClock, DayHold, DayScreen, NextMove } from '@/lib/weaning/day-record'
import type { ProtocolContent } from '@/lib/weaning/protocol'
import { MINUTE_MS, noMove, owed } from './owed'

type Times = { protocol: ProtocolContent; clock: DayClock }

/** The move that a screen leads to: its completion, the sedation hold, the trial, or none today. `hold` is the day's latest, if any. */
export function afterScreen(screen: DayScreen, hold: DayHold | null, { protocol, clock }: Times): NextMove {
  const sinceMs = screen.observedMs
  switch (screen.result) {
    case 'incomplete': {
      const dueMs = Math.max(clock.windowClosesMs, sinceMs)
      return owed(clock, 'complete_screen', { sinceMs, dueMs }, { code: 'not_assessed', criteria: screen.notAssessed })
    }
    case 'not_ready':
      return noMove({ code: 'not_ready', criteria: screen.notMet })
    case 'excused':
      return noMove({ code: 'excused', excuse: screen.excuse ?? 'other' })
    case 'ready': {
      if (hold !== null) return afterHold(screen, hold, { protocol, clock })
      const dueMs = sinceMs + protocol.hold.startWithinMin * MINUTE_MS
      return owed(clock, 'hold', { sinceMs, dueMs }, { code: 'screen_ready', atMs: sinceMs })
    }
  }
}

function afterHold(screen: DayScreen, hold: DayHold, { protocol, clock }: Times): NextMove {
  const endedMs = hold.endedMs ?? hold.startedMs
  const withinMs = protocol.trial.startWithinMin * MINUTE_MS
  const sinceMs = Math.max(screen.observedMs, endedMs)
  if (hold.start === 'unsafe') return noMove({ code: 'hold_unsafe', items: hold.unsafeBecause })
  if (hold.start === 'not_needed') {
    return owed(clock, 'start_trial', { sinceMs, dueMs: sinceMs + withinMs }, { code: 'hold_not_needed', atMs: hold.startedMs })
  }
  if (hold.outcome === 'not_tolerated') return noMove({ code: 'hold_not_tolerated', atMs: endedMs })
  if (hold.outcome !== 'tolerated') return noMove({ code: 'hold_stopped', atMs: endedMs })
  const closesMs = hold.startedMs + protocol.pairingWindowMin * MINUTE_MS
  const dueMs = Math.max(closesMs, sinceMs + withinMs)
  const why =
    dueMs === closesMs ? ({ code: 'pairing_window', closesMs } as const) : ({ code: 'hold_tolerated', atMs: endedMs } as const)
  return owed(clock, 'start_trial', { sinceMs, dueMs }, why)
}
