import type { DayClock, MoveReason, MoveStep, NextMove, NoMoveReason } from '@/lib/weaning/day-record'
import { STEP_ROLES } from './step-roles'

export const MINUTE_MS = 60_000

/** A move with the role of its step; overdue once its due time has passed. */
export function owed(clock: DayClock, step: MoveStep, times: { sinceMs: number; dueMs: number }, why: MoveReason): NextMove {
  return { kind: 'move', step, role: STEP_ROLES[step], ...times, isOverdue: clock.nowMs > times.dueMs, why }
}

/** No move, and the stated reason. */
export function noMove(reason: NoMoveReason): NextMove {
  return { kind: 'none', reason }
}
