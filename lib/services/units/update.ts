import 'server-only'
import { hasAnyStay, updateUnitRow } from '@/db/queries/units'
import { authorize } from '@/lib/access/door'
import type { UnitAdminDto, UpdateUnitInput } from '@/lib/schemas/units'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import { invalidField } from '@/lib/shared/errors'
import { refuseStale } from '../people/refuse-stale'
import { readUnitAdminDto } from './to-unit-admin-dto'

/** Changes a unit's name, place and day track. The time zone is fixed once the unit has had a patient, since recorded days go by it. */
export function updateUnit(ctx: Ctx, input: UpdateUnitInput): UnitAdminDto {
  const { actor } = authorize(ctx, 'units.manage', 'hospital')
  return once(ctx, 'units.manage', input, (tx) => {
    const { unitId, version, ...change } = input
    const { beds: _beds, ...before } = readUnitAdminDto(tx, unitId, actor.hospitalId)
    if (change.timeZone !== before.timeZone && hasAnyStay(tx, unitId)) {
      throw invalidField('timeZone', `This unit has records by ${before.timeZone}; the time zone cannot change any more.`)
    }
    refuseStale(updateUnitRow(tx, unitId, version, change))
    writeAudit(tx, ctx, { action: 'unit.update', unitId, subject: { kind: 'unit', id: unitId }, before, after: change })
    return readUnitAdminDto(tx, unitId, actor.hospitalId)
  })
}
