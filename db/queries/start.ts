import 'server-only'
import { sql } from 'drizzle-orm'
import type { Tx } from '../client'
import { hospitals } from '../schema'

/** Whether each hospital of this database is an invented one; empty before the first set-up. */
export function listHospitalKinds(tx: Tx): { isDemo: boolean }[] {
  return tx.select({ isDemo: hospitals.isDemo }).from(hospitals).all()
}

/** Reads one value, to see that the database answers. */
export function ping(tx: Tx): void {
  tx.get(sql`select 1`)
}
