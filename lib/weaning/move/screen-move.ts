import type { DayClock, DayRecord, NextMove } from '@/lib/weaning/day-record'
import { noMove, owed } from './owed'

/** The move when today has no screen: the screen, once the window is open, unless ventilation began after it had closed. */
export function screenMove(record: DayRecord, clock: DayClock): NextMove {
  const { windowOpensMs, windowClosesMs, nowMs } = clock
  const startedMs = record.episodeStartedMs
  if (startedMs > windowClosesMs) return noMove({ code: 'started_after_window', startedMs })
  if (nowMs < windowOpensMs) return noMove({ code: 'before_window', opensMs: windowOpensMs })
  const times = { sinceMs: Math.max(windowOpensMs, startedMs), dueMs: windowClosesMs }
  const isClosed = nowMs > windowClosesMs
  return owed(
    clock,
    'screen',
    times,
    isClosed ? { code: 'window_closed', closedMs: windowClosesMs } : { code: 'window_open', closesMs: windowClosesMs },
  )
}
