import 'server-only'
import { findHospital, updateHospitalRow } from '@/db/queries/units'
import { authorize } from '@/lib/access/door'
import type { HospitalDto, UpdateHospitalInput } from '@/lib/schemas/hospital'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import { AppError } from '@/lib/shared/errors'
import { refuseStale } from '../people/refuse-stale'

/** Changes the hospital's name and the minutes without activity after which screens lock. Holds from the next request on. */
export function updateHospital(ctx: Ctx, input: UpdateHospitalInput): HospitalDto {
  const { hospitalId } = authorize(ctx, 'hospital.manage', 'hospital').actor
  return once(ctx, 'hospital.manage', input, (tx) => {
    const before = findHospital(tx, hospitalId)
    if (!before) throw new AppError('NOT_FOUND', 'Not found.')
    const { name, idleLockMin, version } = input
    refuseStale(updateHospitalRow(tx, hospitalId, version, { name, idleLockMin }))
    writeAudit(tx, ctx, {
      action: 'hospital.update',
      subject: { kind: 'hospital', id: hospitalId },
      before: { name: before.name, idleLockMin: before.idleLockMin },
      after: { name, idleLockMin },
    })
    return { name, idleLockMin, isDemo: before.isDemo, version: version + 1 }
  })
}
