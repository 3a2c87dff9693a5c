import type { NamedScreen } from '@/db/queries/screens'
import type { ScreenDto } from '@/lib/schemas/screens'
import { toEntryDto } from '../entries/to-entry-dto'

export function toScreenDto({ row, recordedByName, protocolNumber }: NamedScreen): ScreenDto {
  return {
    ...toEntryDto(row, recordedByName, protocolNumber),
    result: row.result,
    excuse: row.excuse,
    note: row.note,
    readings: row.readings,
    verdict: row.verdict,
  }
}
