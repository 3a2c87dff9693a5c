import 'server-only'
import { migrateDatabase, type Db } from '@/db/client'
import { listHospitalKinds } from '@/db/queries/start'
import { requestDatabase } from './database'
import { readEnv } from './env'

/**
 * Opens this process's database and brings its schema up to date. Refuses to mix invented and real patients: a database that holds
 * a demo hospital opens only with DAYBREATH_DEMO=1, and any other only without.
 */
export function prepareDatabase(): Db {
  const db = requestDatabase()
  migrateDatabase(db)
  refuseMixture(db, readEnv().isDemo)
  return db
}

/** Throws when the database holds the other kind of data than this server serves. */
export function refuseMixture(db: Db, isDemo: boolean): void {
  const kinds = listHospitalKinds(db)
  if (!isDemo && kinds.some((hospital) => hospital.isDemo)) {
    throw new Error('This database holds invented demo data. Real use needs a database of its own: set DAYBREATH_DATABASE.')
  }
  if (isDemo && kinds.some((hospital) => !hospital.isDemo)) {
    throw new Error(
      'This database belongs to a real hospital. The demo never opens one: unset DAYBREATH_DEMO or DAYBREATH_DATABASE.',
    )
  }
}

/** Whether nobody has set up a hospital yet. */
export function isWithoutHospital(db: Db): boolean {
  return listHospitalKinds(db).length === 0
}
