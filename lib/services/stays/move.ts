import 'server-only'
import { endStayRow, findOpenStay, insertStay } from '@/db/queries/stays'
import { findUnitOfHospital } from '@/db/queries/units'
import { authorize } from '@/lib/access/door'
import type { MoveStayInput } from '@/lib/schemas/stays'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import { AppError, invalidField } from '@/lib/shared/errors'
import { formatTime } from '@/lib/shared/format'
import { newId } from '@/lib/shared/ids'
import { resolveObserved } from '../entries/resolve-observed'
import { requireFreeBed } from './require-free-bed'

/** Moves a patient to another bed of this or another unit of the hospital, from a stated time on. Answers the new stay's id. */
export function moveStay(ctx: Ctx, input: MoveStayInput): { stayId: string } {
  const { patient, unit } = authorize(ctx, 'stay.move', { patientId: input.patientId })
  return once(ctx, 'stay.move', input, (tx) => {
    const present = findOpenStay(tx, patient.id)
    if (!present) throw new AppError('PRECONDITION', 'This patient is in no bed now. Admit the patient to a bed first.')
    if (present.id !== input.stayId)
      throw new AppError(
        'CONFLICT',
        'This patient was moved in the meantime. Reload the page to see the bed; nothing was changed.',
      )
    const target = findUnitOfHospital(tx, input.unitId, patient.hospitalId)
    if (!target) throw invalidField('unitId', 'This unit is not in use in this hospital. Choose another unit.')
    if (input.bedId === present.bedId) throw invalidField('bedId', 'The patient is in this bed already. Choose another bed.')
    const at = resolveObserved(input.observed, unit.timeZone, ctx.now)
    if (at <= present.startedAt) {
      const since = formatTime(present.startedAt, unit.timeZone, ctx.now)
      throw invalidField('observed.time', `The patient has been in this bed since ${since}. Give a later time.`)
    }
    const bed = requireFreeBed(tx, { bedId: input.bedId, unit: target, at, now: ctx.now })
    const before = endStayRow(tx, present, { endedAt: at, end: 'moved' })
    const after = insertStay(tx, { id: newId(), patientId: patient.id, unitId: target.id, bedId: bed.id, startedAt: at })
    writeAudit(tx, ctx, { action: 'stay.move', unitId: unit.id, subject: { kind: 'patient', id: patient.id }, before, after })
    return { stayId: after.id }
  })
}
