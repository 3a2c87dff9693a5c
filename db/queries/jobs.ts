import 'server-only'
import { and, desc, eq, isNull, lt } from 'drizzle-orm'
import type { Tx } from '../client'
import { jobRuns } from '../schema'

export function insertJobRun(tx: Tx, row: typeof jobRuns.$inferInsert): void {
  tx.insert(jobRuns).values(row).run()
}

export function endJobRun(tx: Tx, id: string, end: { endedAt: number; result: 'ok' | 'failed'; detail: string | null }): void {
  tx.update(jobRuns).set(end).where(eq(jobRuns.id, id)).run()
}

export function findLastJobRun(tx: Tx, job: string) {
  return tx.select().from(jobRuns).where(eq(jobRuns.job, job)).orderBy(desc(jobRuns.startedAt)).limit(1).get()
}

/** Removes finished, successful runs of before a moment; failures stay. */
export function deleteOldJobRuns(tx: Tx, before: number): void {
  tx.delete(jobRuns)
    .where(and(lt(jobRuns.startedAt, before), eq(jobRuns.result, 'ok')))
    .run()
}

/** Marks runs that never ended (their process died) as failed. */
export function failUnfinishedJobRuns(tx: Tx, startedBefore: number, endedAt: number): void {
  tx.update(jobRuns)
    .set({ endedAt, result: 'failed', detail: 'The process ended before the run did.' })
    .where(and(isNull(jobRuns.endedAt), lt(jobRuns.startedAt, startedBefore)))
    .run()
}
