import { runRecorded } from '@/lib/services/jobs/run-recorded'
import { JOBS } from './registry'

/** Runs one job by name. Answers whether it went well; an unknown name is a mistake of the caller. */
export function runJob(name: string): Promise<boolean> {
  const job = JOBS.find((known) => known.name === name)
  if (!job) throw new Error(`There is no job named ${name}. Known: ${JOBS.map((known) => known.name).join(', ')}.`)
  return runRecorded(job)
}
