import 'server-only'
import type { Tx } from '@/db/client'
import { findProtocolInForce, findProtocolVersion } from '@/db/queries/protocols'
import { AppError } from '@/lib/shared/errors'
import type { ProtocolContent } from '@/lib/weaning/protocol'
import type { FindProtocol } from './to-day-record'

/**
 * The unit's protocol version in force at a moment, and a look-up for the versions that running steps began under. Throws PRECONDITION
 * for a unit without any.
 */
export function findUnitProtocol(tx: Tx, unitId: string, at: number) {
  const inForce = findProtocolInForce(tx, unitId, at)
  if (!inForce) throw new AppError('PRECONDITION', 'This unit has no protocol yet. An administrator sets the unit up first.')
  const known = new Map<string, ProtocolContent>([[inForce.id, inForce.content]])
  const find: FindProtocol = (id) => {
    const content = known.get(id) ?? findProtocolVersion(tx, id)?.content ?? inForce.content
    known.set(id, content)
    return content
  }
  return { inForce, find }
}
