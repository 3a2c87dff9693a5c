import 'server-only'
import { findPatientByRecordNumber, updatePatient } from '@/db/queries/patients'
import { authorize } from '@/lib/access/door'
import type { CorrectPatientInput } from '@/lib/schemas/patients'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import { AppError, invalidField } from '@/lib/shared/errors'
import { refuseImpossibleBirth } from './refuse-impossible-birth'

/** Corrects who the patient is. What stood before stays in the audit log. Verdicts already recorded are not judged again. */
export function correctPatient(ctx: Ctx, input: CorrectPatientInput): { version: number } {
  const { patient, unit } = authorize(ctx, 'patient.correct', { patientId: input.patientId })
  return once(ctx, 'patient.correct', input, (tx) => {
    refuseImpossibleBirth(input.birthDate, ctx.now, unit.timeZone)
    const holder = findPatientByRecordNumber(tx, patient.hospitalId, input.recordNumber)
    if (holder && holder.id !== patient.id)
      throw invalidField('recordNumber', 'Another patient has this record number. Check the number.')
    const { recordNumber, familyName, givenName, birthDate, sex, heightCm, weightKg } = input
    const after = updatePatient(
      tx,
      { id: patient.id, version: input.version },
      {
        recordNumber,
        familyName,
        givenName,
        birthDate,
        sex,
        heightCm,
        weightKg,
      },
    )
    if (!after)
      throw new AppError(
        'CONFLICT',
        'Someone changed these details in the meantime. Reload the page to see them; nothing was changed.',
      )
    writeAudit(tx, ctx, {
      action: 'patient.correct',
      unitId: unit.id,
      subject: { kind: 'patient', id: patient.id },
      before: patient,
      after,
    })
    return { version: after.version }
  })
}
