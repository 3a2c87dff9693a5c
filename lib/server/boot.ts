import 'server-only'
import type { Db } from '@/db/client'
import { startScheduler } from '@/jobs/scheduler'
import { createSetupLink } from '@/lib/services/people/create-setup-link'
import { newId } from '@/lib/shared/ids'
import type { Ctx } from './ctx'
import { readEnv } from './env'
import { log } from './log'
import { isWithoutHospital, prepareDatabase } from './prepare-database'

const shared = globalThis as typeof globalThis & { daybreathIsBooted?: true }

/**
 * Starts this server, once: settings checked, database opened and brought up to date, set-up link printed when the database is
 * empty, jobs running. Anything wrong ends the process with a message that says what, before a single request is answered.
 */
export function boot(): void {
  if (shared.daybreathIsBooted) return
  shared.daybreathIsBooted = true
  try {
    const env = readEnv()
    const db = prepareDatabase()
    if (isWithoutHospital(db) && !env.isDemo) printSetupLink(db)
    if (env.runsJobs) startScheduler()
    log.info({ isDemo: env.isDemo, runsJobs: env.runsJobs }, 'started')
  } catch (error) {
    console.error(error instanceof Error ? error.message : 'Daybreath could not start.')
    process.exit(1)
  }
}

/** Prints the link by which the first administrator sets up the hospital. Whoever can read this output may use it. */
function printSetupLink(db: Db): void {
  const ctx: Ctx = { actor: { kind: 'system' }, now: Date.now(), requestId: newId(), db, idempotencyKey: null }
  const { url } = createSetupLink(ctx)
  console.log(`\nNobody is set up yet. This link works once, for 24 hours, and makes the first administrator:\n  ${url}\n`)
}
