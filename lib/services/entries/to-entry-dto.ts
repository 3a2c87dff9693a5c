import type { EntryDto } from '@/lib/schemas/observed'
import { listUnlikely } from '@/lib/schemas/reading'
import { MINUTE_MS } from '@/lib/shared/time'

/** An entry counts as late when it was recorded more than this after it was observed. */
export const LATE_AFTER_MS = 30 * MINUTE_MS

type EntryRow = {
  id: string
  entryId: string
  entryVersion: number
  amendReason: string | null
  observedAt: number
  recordedAt: number
  ventilatorDay: string
}

/** The part of an answer that every entry shares. Pass the whole row: unlikely values are found in it and named. */
export function toEntryDto(row: EntryRow, recordedByName: string, protocolNumber: number): EntryDto {
  return {
    id: row.id,
    entryId: row.entryId,
    entryVersion: row.entryVersion,
    isAmended: row.entryVersion > 1,
    amendReason: row.amendReason,
    isLate: row.recordedAt - row.observedAt > LATE_AFTER_MS,
    observedAt: row.observedAt,
    recordedAt: row.recordedAt,
    recordedByName,
    ventilatorDay: row.ventilatorDay,
    protocolNumber,
    unlikely: listUnlikely(row),
  }
}
