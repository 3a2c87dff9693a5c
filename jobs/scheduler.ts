import { schedule } from 'node-cron'
import { JOBS } from './registry'
import { runJob } from './run-job'

const shared = globalThis as typeof globalThis & { daybreathScheduler?: true }

/** Starts every scheduled job once in this process, and runs each once right away so that a restart catches up. */
export function startScheduler(): void {
  if (shared.daybreathScheduler) return
  shared.daybreathScheduler = true
  for (const job of JOBS) {
    if (job.schedule === null) continue
    schedule(job.schedule, () => runJob(job.name), { noOverlap: true, name: job.name })
    void runJob(job.name)
  }
}
