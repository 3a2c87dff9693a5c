import 'server-only'
import { deleteOldJobRuns, failUnfinishedJobRuns } from '@/db/queries/jobs'
import type { Ctx } from '@/lib/server/ctx'
import { AppError } from '@/lib/shared/errors'
import { HOUR_MS } from '@/lib/shared/time'

/** Closes runs whose process died and removes successful runs older than 30 days. Touches no clinical row. */
// no-door: run by the jobs.tidy job only; it sees rows about jobs and nothing else
export function tidyJobRuns(ctx: Ctx): { isTidy: true } {
  if (ctx.actor.kind !== 'job') throw new AppError('FORBIDDEN', 'Only the scheduled job does this.')
  failUnfinishedJobRuns(ctx.db, ctx.now - HOUR_MS, ctx.now)
  deleteOldJobRuns(ctx.db, ctx.now - 30 * 24 * HOUR_MS)
  return { isTidy: true }
}
