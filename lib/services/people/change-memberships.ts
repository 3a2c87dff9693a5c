import 'server-only'
import type { Tx } from '@/db/client'
import { endMemberships, insertMembership, listMembershipsOf } from '@/db/queries/people'
import { listUnitsOfHospital } from '@/db/queries/units'
import { AppError } from '@/lib/shared/errors'
import { newId } from '@/lib/shared/ids'
import type { ClinicalRole } from '@/lib/weaning/vocabulary'

type Wanted = readonly { unitId: string; role: ClinicalRole }[]

/**
 * Makes a person hold exactly these roles: ends those not wanted any more, begins the new ones, leaves the rest as they were.
 * Throws NOT_FOUND when a unit is not one of the hospital's.
 */
export function changeMemberships(tx: Tx, change: { personId: string; hospitalId: string; wanted: Wanted; now: number }): void {
  const { personId, hospitalId, wanted, now } = change
  const unitIds = new Set(listUnitsOfHospital(tx, hospitalId).map((unit) => unit.id))
  if (wanted.some((one) => !unitIds.has(one.unitId))) throw new AppError('NOT_FOUND', 'That unit was not found in this hospital.')
  const held = listMembershipsOf(tx, [personId])
  const isSame = (a: { unitId: string; role: string }, b: { unitId: string; role: string }) =>
    a.unitId === b.unitId && a.role === b.role
  endMemberships(
    tx,
    held.filter((one) => !wanted.some((other) => isSame(one, other))).map((one) => one.id),
    now,
  )
  for (const one of wanted) {
    if (held.some((other) => isSame(one, other))) continue
    insertMembership(tx, { id: newId(), personId, unitId: one.unitId, role: one.role, startedAt: now })
  }
}
