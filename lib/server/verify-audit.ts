import 'server-only'
import type { Tx } from '@/db/client'
import { listAuditRowsAfter } from '@/db/queries/audit-walk'
import { hashAuditRow } from './audit'

/** Whether the audit log is whole, and if not, the number of the first row that does not fit and what is wrong with it. */
export type AuditCheck =
  { isWhole: true; rows: number } | { isWhole: false; atSeq: number; fault: 'changed' | 'out_of_chain' | 'missing' }

const PAGE_ROWS = 1_000

/**
 * Walks the audit log from its first row: numbers without a gap, each row's hash over its content and the row before. A changed,
 * removed or inserted row shows; rows cut off at the very end do not, a later copy or backup shows those.
 */
export function verifyAuditLog(tx: Tx): AuditCheck {
  let seq = 0
  let previousHash = ''
  for (;;) {
    const page = listAuditRowsAfter(tx, seq, PAGE_ROWS)
    for (const row of page) {
      if (row.seq !== seq + 1) return { isWhole: false, atSeq: seq + 1, fault: 'missing' }
      const { seq: _seq, previousHash: claimedPrevious, hash, ...content } = row
      if (claimedPrevious !== previousHash) return { isWhole: false, atSeq: row.seq, fault: 'out_of_chain' }
      if (hashAuditRow(previousHash, content) !== hash) return { isWhole: false, atSeq: row.seq, fault: 'changed' }
      seq = row.seq
      previousHash = hash
    }
    if (page.length < PAGE_ROWS) return { isWhole: true, rows: seq }
  }
}
