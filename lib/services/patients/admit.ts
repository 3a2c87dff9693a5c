import 'server-only'
import type { Tx } from '@/db/client'
import { findPatientByRecordNumber, insertPatient, updatePatient } from '@/db/queries/patients'
import { findLastEndedStay, findOpenStay, insertStay } from '@/db/queries/stays'
import { authorize, type PatientRow, type UnitRow } from '@/lib/access/door'
import type { AdmitPatientInput, AdmittedDto } from '@/lib/schemas/patients'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import { AppError, invalidField } from '@/lib/shared/errors'
import { formatTime } from '@/lib/shared/format'
import { newId } from '@/lib/shared/ids'
import { HOUR_MS } from '@/lib/shared/time'
import { resolveObserved } from '../entries/resolve-observed'
import { requireFreeBed } from '../stays/require-free-bed'
import { refuseImpossibleBirth } from './refuse-impossible-birth'
import { isSameName } from './same-name'

/** An admission further back is a slip of the year. Common practice, no source. */
const LONGEST_STAY_MS = 2 * 366 * 24 * HOUR_MS

/**
 * Admits a patient to a bed. A record number that the hospital knows means a readmission: name, birth date and sex must agree with the
 * record, height and weight are brought up to date. Nothing of a record that does not agree is shown.
 */
export function admitPatient(ctx: Ctx, input: AdmitPatientInput): AdmittedDto {
  const { unit } = authorize(ctx, 'patient.admit', { unitId: input.unitId })
  return once(ctx, 'patient.admit', input, (tx) => {
    const at = resolveObserved(input.observed, unit.timeZone, ctx.now)
    if (at < ctx.now - LONGEST_STAY_MS) throw invalidField('observed.day', 'This is more than two years ago. Look at the year.')
    refuseImpossibleBirth(input.birthDate, ctx.now, unit.timeZone)
    const known = findPatientByRecordNumber(tx, unit.hospitalId, input.recordNumber)
    if (known) refuseOtherPatient(tx, ctx, known, input, unit, at)
    const bed = requireFreeBed(tx, { bedId: input.bedId, unit, at, now: ctx.now })
    const patient = known ? bringUpToDate(tx, known, input) : createPatient(tx, ctx, unit, input)
    const stay = insertStay(tx, { id: newId(), patientId: patient.id, unitId: unit.id, bedId: bed.id, startedAt: at })
    writeAudit(tx, ctx, {
      action: known ? 'patient.readmit' : 'patient.admit',
      unitId: unit.id,
      subject: { kind: 'patient', id: patient.id },
      before: known,
      after: { patient, stay },
    })
    return { patientId: patient.id, stayId: stay.id, isReadmission: known !== undefined }
  })
}

function createPatient(tx: Tx, ctx: Ctx, unit: UnitRow, input: AdmitPatientInput): PatientRow {
  if (ctx.actor.kind !== 'person') throw new AppError('FORBIDDEN', 'Only a person can admit a patient.')
  const { recordNumber, familyName, givenName, birthDate, sex, heightCm, weightKg } = input
  return insertPatient(tx, {
    id: newId(),
    hospitalId: unit.hospitalId,
    recordNumber,
    familyName,
    givenName,
    birthDate,
    sex,
    heightCm,
    weightKg,
    createdAt: ctx.now,
    createdBy: ctx.actor.personId,
  })
}

function bringUpToDate(tx: Tx, known: PatientRow, input: AdmitPatientInput): PatientRow {
  const after = updatePatient(tx, known, {
    birthDate: input.birthDate ?? known.birthDate,
    sex: input.sex ?? known.sex,
    heightCm: input.heightCm ?? known.heightCm,
    weightKg: input.weightKg ?? known.weightKg,
  })
  if (!after) throw new AppError('CONFLICT', 'Someone changed this patient’s details in the meantime. Try once more.')
  return after
}

function refuseOtherPatient(tx: Tx, ctx: Ctx, known: PatientRow, input: AdmitPatientInput, unit: UnitRow, at: number): void {
  const disagree = (field: string, message: string) =>
    new AppError('CONFLICT', 'The record number and the patient do not agree. Nothing was recorded.', { [field]: message })
  if (!isSameName(known, input)) {
    throw disagree('recordNumber', 'This record number belongs to another name. Check the number and the spelling of the name.')
  }
  if (known.birthDate !== null && input.birthDate !== null && known.birthDate !== input.birthDate) {
    throw disagree(
      'birthDate',
      'This record number has another date of birth. Check both; the record can be corrected after admission.',
    )
  }
  if (known.sex !== null && input.sex !== null && known.sex !== input.sex) {
    throw disagree(
      'sex',
      'This record number has the other sex on record. Check it; the record can be corrected after admission.',
    )
  }
  const present = findOpenStay(tx, known.id)
  if (present) {
    throw disagree(
      'recordNumber',
      present.unitId === unit.id
        ? 'This patient is in a bed of this unit already.'
        : 'This patient is in a bed of another unit. A move from there brings the patient here.',
    )
  }
  const left = findLastEndedStay(tx, known.id)?.endedAt ?? 0
  if (at < left)
    throw invalidField(
      'observed.time',
      `The patient left the last bed at ${formatTime(left, unit.timeZone, ctx.now)}. Give a later time.`,
    )
}
