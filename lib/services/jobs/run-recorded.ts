import 'server-only'
import { endJobRun, insertJobRun } from '@/db/queries/jobs'
import type { Ctx } from '@/lib/server/ctx'
import { requestDatabase } from '@/lib/server/database'
import { log } from '@/lib/server/log'
import { newId } from '@/lib/shared/ids'

/** Jobs that run every few seconds leave a row only when they did something or failed. */
type RecordedJob = { name: string; isQuiet: boolean; run: (ctx: Ctx) => unknown }

const running = new Set<string>()

/**
 * Runs one job as actor `job:<name>` and keeps a row of start, end and result. A second start while it still runs is skipped.
 * A failure is logged and kept in the row, and does not stop the scheduler. Answers whether it went well.
 */
// no-door: it only wraps a verb, and the verb has its own door
export async function runRecorded(job: RecordedJob): Promise<boolean> {
  if (running.has(job.name)) return true
  running.add(job.name)
  const id = newId()
  const startedAt = Date.now()
  const db = requestDatabase()
  if (!job.isQuiet) insertJobRun(db, { id, job: job.name, startedAt })
  try {
    const answer = await job.run({
      actor: { kind: 'job', name: job.name },
      now: startedAt,
      requestId: id,
      db,
      idempotencyKey: null,
    })
    const detail = JSON.stringify(answer ?? null)
    if (!job.isQuiet) endJobRun(db, id, { endedAt: Date.now(), result: 'ok', detail })
    else if (/[1-9]/.test(detail)) insertJobRun(db, { id, job: job.name, startedAt, endedAt: Date.now(), result: 'ok', detail })
    return true
  } catch (error) {
    const name = error instanceof Error ? error.name : 'unknown'
    log.error({ job: job.name, run: id, err: error instanceof Error ? { name, stack: error.stack } : name }, 'job failed')
    const end = { endedAt: Date.now(), result: 'failed', detail: name } as const
    if (job.isQuiet) insertJobRun(db, { id, job: job.name, startedAt, ...end })
    else endJobRun(db, id, end)
    return false
  } finally {
    running.delete(job.name)
  }
}
