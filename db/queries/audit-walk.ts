import 'server-only'
import { asc, gt } from 'drizzle-orm'
import type { Tx } from '../client'
import { auditLog } from '../schema'

/** The next audit rows after a number, oldest first. */
export function listAuditRowsAfter(tx: Tx, seq: number, limit: number) {
  return tx.select().from(auditLog).where(gt(auditLog.seq, seq)).orderBy(asc(auditLog.seq)).limit(limit).all()
}
