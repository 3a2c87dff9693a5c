import 'server-only'
import { authorize } from '@/lib/access/door'
import type { AddBedsInput, UnitAdminDto } from '@/lib/schemas/units'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import { placeBeds } from './place-beds'
import { readUnitAdminDto } from './to-unit-admin-dto'

/** Adds beds to a unit, in the order given; a retired bed of the same label comes back. */
export function addBeds(ctx: Ctx, input: AddBedsInput): UnitAdminDto {
  const { actor } = authorize(ctx, 'units.manage', 'hospital')
  return once(ctx, 'units.manage', input, (tx) => {
    const { id: unitId } = readUnitAdminDto(tx, input.unitId, actor.hospitalId)
    placeBeds(tx, unitId, input.bedLabels, ctx.now)
    writeAudit(tx, ctx, { action: 'bed.add', unitId, subject: { kind: 'unit', id: unitId }, after: { labels: input.bedLabels } })
    return readUnitAdminDto(tx, unitId, actor.hospitalId)
  })
}
