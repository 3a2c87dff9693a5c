import 'server-only'
import type { Db } from '@/db/client'
import { deleteAllowance, deleteAllowancesBefore, findAllowance, saveAllowance } from '@/db/queries/sessions'
import { AppError } from '@/lib/shared/errors'
import { newId } from '@/lib/shared/ids'
import { HOUR_MS, MINUTE_MS } from '@/lib/shared/time'

export type AllowanceRule = { max: number; windowMs: number }

/**
 * Takes one of `max` tries in a window that starts with the first of them, counted in the database and in one step, so that tries at the
 * same moment cannot all pass. Answers the milliseconds to wait when none is left, else null.
 */
export function takeAllowance(db: Db, key: string, rule: AllowanceRule, now: number): number | null {
  return db.transaction(
    (tx) => {
      const row = findAllowance(tx, key)
      // A window start in the future comes from a clock that was set back: start anew rather than wait for it.
      if (!row || now - row.lastRequest >= rule.windowMs || row.lastRequest > now) {
        deleteAllowancesBefore(tx, now - HOUR_MS)
        saveAllowance(tx, { id: newId(), key, count: 1, lastRequest: now })
        return null
      }
      if (row.count >= rule.max) return row.lastRequest + rule.windowMs - now
      saveAllowance(tx, { ...row, count: row.count + 1 })
      return null
    },
    { behavior: 'immediate' },
  )
}

/** Gives all tries back, after a right password. */
export function clearAllowance(db: Db, key: string): void {
  deleteAllowance(db, key)
}

/** Too many tries, with the wait in whole minutes. */
export function tooManyTries(waitMs: number): AppError {
  const minutes = Math.max(1, Math.ceil(waitMs / MINUTE_MS))
  return new AppError(
    'RATE_LIMITED',
    `Too many tries. Please wait ${minutes} ${minutes === 1 ? 'minute' : 'minutes'}, then try again.`,
  )
}
