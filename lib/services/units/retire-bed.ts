import 'server-only'
import { findBedOfHospital, isBedTaken, setBedRetired } from '@/db/queries/units'
import { authorize } from '@/lib/access/door'
import type { RetireBedInput, UnitAdminDto } from '@/lib/schemas/units'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import { AppError } from '@/lib/shared/errors'
import { readUnitAdminDto } from './to-unit-admin-dto'

/** Takes an empty bed out of use. What was recorded there stays; adding the same label brings the bed back. */
export function retireBed(ctx: Ctx, input: RetireBedInput): UnitAdminDto {
  const { actor } = authorize(ctx, 'units.manage', 'hospital')
  return once(ctx, 'units.manage', input, (tx) => {
    const bed = findBedOfHospital(tx, input.bedId, actor.hospitalId)
    if (!bed) throw new AppError('NOT_FOUND', 'Not found. The bed may belong to another hospital.')
    if (bed.retiredAt !== null) throw new AppError('PRECONDITION', `Bed ${bed.label} is out of use already.`)
    if (isBedTaken(tx, bed.id)) throw new AppError('PRECONDITION', `Bed ${bed.label} is in use; it must be empty first.`)
    setBedRetired(tx, bed.id, ctx.now)
    writeAudit(tx, ctx, {
      action: 'bed.retire',
      unitId: bed.unitId,
      subject: { kind: 'bed', id: bed.id },
      after: { label: bed.label },
    })
    return readUnitAdminDto(tx, bed.unitId, actor.hospitalId)
  })
}
