import 'server-only'
import type { Tx } from '@/db/client'
import { findLastBedOrder, insertBeds, listBedsOf, setBedRetired } from '@/db/queries/units'
import { invalidField } from '@/lib/shared/errors'
import { newId } from '@/lib/shared/ids'

/**
 * Puts beds into a unit, after those it has. A label that a retired bed carries brings that bed back; a label in use throws INVALID.
 */
export function placeBeds(tx: Tx, unitId: string, labels: readonly string[], now: number): void {
  const known = new Map(listBedsOf(tx, [unitId]).map((bed) => [bed.label.toLowerCase(), bed]))
  const fresh: string[] = []
  for (const label of labels) {
    const bed = known.get(label.toLowerCase())
    if (bed && bed.retiredAt === null) throw invalidField('bedLabels', `Bed ${bed.label} exists already in this unit.`)
    if (bed) setBedRetired(tx, bed.id, null)
    else fresh.push(label)
  }
  if (fresh.length === 0) return
  const last = findLastBedOrder(tx, unitId)
  insertBeds(
    tx,
    fresh.map((label, at) => ({ id: newId(), unitId, label, sortOrder: last + at + 1, createdAt: now })),
  )
}
