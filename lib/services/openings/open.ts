import 'server-only'
import { findLatestStay, findUnit } from '@/db/queries/access'
import { insertOpening } from '@/db/queries/openings'
import { findPatientByRecordNumber } from '@/db/queries/patients'
import { findBedLabel } from '@/db/queries/steps'
import { authorize } from '@/lib/access/door'
import { OPENING_HOURS, type OpenedRecordDto, type OpenRecordInput } from '@/lib/schemas/openings'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx, PersonCtx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import { AuditedRefusal } from '@/lib/shared/errors'
import { newId } from '@/lib/shared/ids'
import { HOUR_MS } from '@/lib/shared/time'
import { queueRecordOpenedMail } from '../mail/queue-record-opened'

/**
 * Opens one patient's record for 8 hours to a clinician from outside the unit, for a stated reason. The unit's leads are told by mail,
 * without a name. A patient of one's own unit needs no opening and gets none.
 */
export function openRecord(ctx: Ctx, input: OpenRecordInput): OpenedRecordDto {
  const person = authorize(ctx, 'opening.open', 'self')
  if (person.actor.memberships.length === 0) {
    refuse(person, 'role')
    throw new AuditedRefusal('FORBIDDEN', 'Only clinicians of this hospital can open a record.')
  }
  const patient = findPatientByRecordNumber(ctx.db, person.actor.hospitalId, input.recordNumber)
  const stay = patient && findLatestStay(ctx.db, patient.id)
  const unit = stay && findUnit(ctx.db, stay.unitId)
  if (!patient || !unit) {
    refuse(person, 'unknown record number')
    throw new AuditedRefusal('NOT_FOUND', 'No patient was found. Nothing was opened.', {
      recordNumber: 'No patient has this record number. Check the number.',
    })
  }
  if (person.actor.memberships.some((held) => held.unitId === unit.id)) return { patientId: patient.id, expiresAt: null }
  return once(ctx, 'opening.open', input, (tx) => {
    const opening = insertOpening(tx, {
      id: newId(),
      patientId: patient.id,
      unitId: unit.id,
      personId: person.actor.personId,
      reason: input.reason,
      openedAt: ctx.now,
      expiresAt: ctx.now + OPENING_HOURS * HOUR_MS,
    })
    const bedLabel = findBedLabel(tx, stay.bedId) ?? ''
    queueRecordOpenedMail(tx, { unit, bedLabel, openingId: opening.id, now: ctx.now })
    writeAudit(tx, ctx, { action: 'opening.open', unitId: unit.id, subject: { kind: 'patient', id: patient.id }, after: opening })
    return { patientId: patient.id, expiresAt: opening.expiresAt }
  })
}

/** A refused opening leaves its trace too; the number that was tried is not kept. */
function refuse(ctx: PersonCtx, because: string): void {
  ctx.db.transaction((tx) => writeAudit(tx, ctx, { action: 'access.denied', after: { asked: 'opening.open', because } }), {
    behavior: 'immediate',
  })
}
