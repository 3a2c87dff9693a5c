import 'server-only'
import { insertFirstProtocol, insertMailSchedule, insertUnit } from '@/db/queries/units'
import { authorize } from '@/lib/access/door'
import type { CreateUnitInput, UnitAdminDto } from '@/lib/schemas/units'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import { newId } from '@/lib/shared/ids'
import { defaultProtocol } from '@/lib/weaning/published/default-protocol'
import { placeBeds } from './place-beds'
import { readUnitAdminDto } from './to-unit-admin-dto'

/** Creates a unit with its beds, the default protocol as version 1, and a morning list by mail when the screening window opens. */
export function createUnit(ctx: Ctx, input: CreateUnitInput): UnitAdminDto {
  const { actor } = authorize(ctx, 'units.manage', 'hospital')
  return once(ctx, 'units.manage', input, (tx) => {
    const { bedLabels, ...unit } = input
    const unitId = newId()
    insertUnit(tx, { id: unitId, hospitalId: actor.hospitalId, ...unit, createdAt: ctx.now })
    placeBeds(tx, unitId, bedLabels, ctx.now)
    insertFirstProtocol(tx, {
      id: newId(),
      unitId,
      number: 1,
      content: defaultProtocol,
      isDefault: true,
      draftedAt: ctx.now,
      startsAt: ctx.now,
      note: 'Default values, in force until a physician of the unit approves a version.',
    })
    insertMailSchedule(tx, { unitId, morningDueMin: defaultProtocol.screeningWindow.opensMin })
    writeAudit(tx, ctx, { action: 'unit.create', unitId, subject: { kind: 'unit', id: unitId }, after: input })
    return readUnitAdminDto(tx, unitId, actor.hospitalId)
  })
}
