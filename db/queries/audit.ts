import 'server-only'
import { desc, eq } from 'drizzle-orm'
import type { Tx } from '../client'
import { auditLog, idempotencyKeys } from '../schema'

/** Hash of the newest audit row; the empty string before the first. */
export function findLastAuditHash(tx: Tx): string {
  return tx.select({ hash: auditLog.hash }).from(auditLog).orderBy(desc(auditLog.seq)).limit(1).get()?.hash ?? ''
}

export function insertAuditRow(tx: Tx, row: typeof auditLog.$inferInsert): void {
  tx.insert(auditLog).values(row).run()
}

export function findIdempotencyKey(tx: Tx, key: string) {
  return tx.select().from(idempotencyKeys).where(eq(idempotencyKeys.key, key)).get()
}

export function insertIdempotencyKey(tx: Tx, row: typeof idempotencyKeys.$inferInsert): void {
  tx.insert(idempotencyKeys).values(row).run()
}
