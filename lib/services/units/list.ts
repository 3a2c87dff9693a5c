import 'server-only'
import { listUnitsOfHospital } from '@/db/queries/units'
import { authorize } from '@/lib/access/door'
import type { UnitAdminDto } from '@/lib/schemas/units'
import type { Ctx } from '@/lib/server/ctx'
import { toUnitAdminDtos } from './to-unit-admin-dto'

/** The units of the administrator's hospital with their beds. */
export function listUnitsForAdmin(ctx: Ctx): { units: UnitAdminDto[] } {
  const { actor } = authorize(ctx, 'units.manage', 'hospital')
  return { units: toUnitAdminDtos(ctx.db, listUnitsOfHospital(ctx.db, actor.hospitalId)) }
}
