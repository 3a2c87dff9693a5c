import 'server-only'
import { findHospital } from '@/db/queries/units'
import { authorize } from '@/lib/access/door'
import type { HospitalDto } from '@/lib/schemas/hospital'
import type { Ctx } from '@/lib/server/ctx'
import { AppError } from '@/lib/shared/errors'

/** The administrator's own hospital. */
export function readHospital(ctx: Ctx): HospitalDto {
  const { actor } = authorize(ctx, 'hospital.manage', 'hospital')
  const hospital = findHospital(ctx.db, actor.hospitalId)
  if (!hospital) throw new AppError('NOT_FOUND', 'Not found.')
  const { name, idleLockMin, isDemo, version } = hospital
  return { name, idleLockMin, isDemo, version }
}
