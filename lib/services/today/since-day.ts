import { HOUR_MS } from '@/lib/shared/time'
import type { DayClock } from '@/lib/weaning/day-record'

/** A time to look again that lies earlier the same day is no longer ago than this. */
export const LONGEST_DAY_MS = 25 * HOUR_MS

/**
 * The first calendar day whose entries the next move looks at: yesterday until the screening window opens, then today. What still runs
 * and a promised time to look again are read from any day. tests/services/today/since-day.test.ts holds it against the whole history.
 */
export function sinceDay(clock: DayClock): string {
  return clock.nowMs < clock.windowOpensMs ? clock.previousDay : clock.day
}
