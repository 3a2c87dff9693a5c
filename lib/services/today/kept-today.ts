import 'server-only'
import { readChangeMark } from '@/db/queries/change-mark'
import type { TodayDto } from '@/lib/schemas/today'
import type { Ctx } from '@/lib/server/ctx'

/** Moves depend on the clock, so an answer is given again for less than this, in milliseconds. */
export const KEPT_FOR_MS = 1000

type Kept = { mark: string; today: TodayDto }
const keptOf = new WeakMap<Ctx['db'], Map<string, Kept>>()

/**
 * Gives a unit's Today again when it was worked out less than a second ago and nothing in the database has changed since: many screens
 * ask for the same unit every few seconds. The reader's right is checked before, each time; the answer holds nothing of the reader.
 */
// no-door: called by today/list after its door
export function keepToday(ctx: Ctx, unitId: string, workOut: () => TodayDto): TodayDto {
  const mark = readChangeMark(ctx.db)
  const units = keptOf.get(ctx.db) ?? new Map<string, Kept>()
  keptOf.set(ctx.db, units)
  const kept = units.get(unitId)
  if (kept?.mark === mark && isFresh(kept.today.nowMs, ctx.now)) return kept.today
  const today = workOut()
  units.set(unitId, { mark, today })
  return today
}

function isFresh(workedOutMs: number, now: number): boolean {
  return now >= workedOutMs && now - workedOutMs < KEPT_FOR_MS
}
