import 'server-only'
import { listPatientsOfUnit } from '@/db/queries/patients'
import { listFreeBeds } from '@/db/queries/today'
import { authorize } from '@/lib/access/door'
import { mayInUnit } from '@/lib/access/policy'
import type { PatientListDto } from '@/lib/schemas/patients'
import type { Ctx } from '@/lib/server/ctx'
import { ageYears, localDay } from '@/lib/shared/time'
import { ventilatorDayNumber } from '@/lib/weaning/course/ventilator-day-number'

/** Everybody now in the unit, ventilated or not, in bed order, and the free beds. */
export function listPatients(ctx: Ctx, input: { unitId: string }): PatientListDto {
  const { unit } = authorize(ctx, 'patient.list', { unitId: input.unitId })
  const today = localDay(ctx.now, unit.timeZone)
  const patients = listPatientsOfUnit(ctx.db, unit.id).map(({ patient, stay, bed, episode, lastEndedAt }) => ({
    patientId: patient.id,
    bedLabel: bed.label,
    bedOrder: bed.sortOrder,
    recordNumber: patient.recordNumber,
    familyName: patient.familyName,
    givenName: patient.givenName,
    ageYears: ageYears(patient.birthDate, today),
    sex: patient.sex,
    admittedAt: stay.startedAt,
    episode: episode && {
      ...episode,
      ventilatorDayNumber: ventilatorDayNumber(localDay(episode.startedAt, unit.timeZone), today),
    },
    lastEndedAt,
  }))
  return {
    unit: { id: unit.id, name: unit.name, timeZone: unit.timeZone },
    nowMs: ctx.now,
    patients,
    freeBeds: listFreeBeds(ctx.db, unit.id),
    mayAdmit: ctx.actor.kind === 'person' && mayInUnit(ctx.actor.memberships, 'patient.admit', unit.id),
  }
}
