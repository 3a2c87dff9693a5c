import 'server-only'
import type { Tx } from '@/db/client'
import { findProtocolVersion } from '@/db/queries/protocols'
import type { protocolVersions } from '@/db/schema'
import type { FormProtocolDto } from '@/lib/schemas/step-form'

export type ProtocolRow = typeof protocolVersions.$inferSelect

/**
 * The version that judges: the one that the corrected entry, or the hold or trial that it belongs to, was recorded under; else the one in
 * force. So a changed protocol never rejudges the past, and a trial is judged by one protocol from start to end.
 */
export function judgingProtocol(tx: Tx, earlierVersionId: string | null | undefined, inForce: ProtocolRow): ProtocolRow {
  if (!earlierVersionId || earlierVersionId === inForce.id) return inForce
  const earlier = findProtocolVersion(tx, earlierVersionId)
  if (!earlier) throw new Error('A protocol version that an entry names is missing.')
  return earlier
}

export function toFormProtocolDto(row: ProtocolRow): FormProtocolDto {
  return { id: row.id, number: row.number, isDefault: row.isDefault, startsAt: row.startsAt, content: row.content }
}
