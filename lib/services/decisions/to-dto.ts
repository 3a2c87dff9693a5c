import type { NamedDecision } from '@/db/queries/decisions'
import type { DecisionDto } from '@/lib/schemas/decisions'
import { toEntryDto } from '../entries/to-entry-dto'

export function toDecisionDto({ row, recordedByName, protocolNumber }: NamedDecision): DecisionDto {
  return {
    ...toEntryDto(row, recordedByName, protocolNumber),
    choice: row.choice,
    reasons: row.reasons,
    lookAgainAt: row.lookAgainAt,
    supportAfter: row.supportAfter,
    steroidsPlanned: row.steroidsPlanned,
    note: row.note,
    statement: row.statement,
    contentHash: row.contentHash,
  }
}
