import 'server-only'
import { eq } from 'drizzle-orm'
import type { Tx } from '../client'
import { gases } from '../schema'

/** One version, and whether a newer one supersedes it. */
export function findGasVersion(tx: Tx, id: string) {
  const row = tx.select().from(gases).where(eq(gases.id, id)).get()
  if (!row) return undefined
  const isSuperseded = tx.select({ id: gases.id }).from(gases).where(eq(gases.supersedesId, id)).get() !== undefined
  return { row, isSuperseded }
}

export function insertGas(tx: Tx, row: typeof gases.$inferInsert) {
  return tx.insert(gases).values(row).returning().get()
}
