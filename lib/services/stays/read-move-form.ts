import 'server-only'
import { findBedLabel } from '@/db/queries/steps'
import { listFreeBeds } from '@/db/queries/today'
import { listUnitsOfHospital } from '@/db/queries/units'
import { authorize } from '@/lib/access/door'
import type { MoveFormDto } from '@/lib/schemas/stays'
import type { Ctx } from '@/lib/server/ctx'
import { AppError } from '@/lib/shared/errors'

/** What the form for a move shows: where the patient is, and the free beds of every unit of the hospital. */
export function readMoveForm(ctx: Ctx, input: { patientId: string }): MoveFormDto {
  const { patient, stay, unit } = authorize(ctx, 'stay.move', { patientId: input.patientId })
  if (stay.endedAt !== null)
    throw new AppError('PRECONDITION', 'This patient is in no bed now. Admit the patient to a bed first.')
  return {
    nowMs: ctx.now,
    timeZone: unit.timeZone,
    patient: { id: patient.id, familyName: patient.familyName, givenName: patient.givenName },
    stay: { id: stay.id, unitId: unit.id, bedLabel: findBedLabel(ctx.db, stay.bedId) ?? '', startedAt: stay.startedAt },
    units: listUnitsOfHospital(ctx.db, patient.hospitalId).map(({ id, name }) => ({
      id,
      name,
      freeBeds: listFreeBeds(ctx.db, id),
    })),
  }
}
