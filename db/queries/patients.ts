import 'server-only'
import { and, asc, eq, isNull, sql } from 'drizzle-orm'
import type { Tx } from '../client'
import { beds, episodes, patients, stays } from '../schema'

export function findPatientByRecordNumber(tx: Tx, hospitalId: string, recordNumber: string) {
  return tx
    .select()
    .from(patients)
    .where(and(eq(patients.hospitalId, hospitalId), eq(patients.recordNumber, recordNumber)))
    .get()
}

export function insertPatient(tx: Tx, row: typeof patients.$inferInsert) {
  return tx.insert(patients).values(row).returning().get()
}

/** Changes a patient at a known version. Undefined when somebody else changed it meanwhile. */
export function updatePatient(tx: Tx, patient: { id: string; version: number }, change: Partial<typeof patients.$inferInsert>) {
  return tx
    .update(patients)
    .set({ ...change, version: patient.version + 1 })
    .where(and(eq(patients.id, patient.id), eq(patients.version, patient.version)))
    .returning()
    .get()
}

/** Patients now in a unit, in bed order, each with the open episode and with the end of the last one, if there was any. */
export function listPatientsOfUnit(tx: Tx, unitId: string) {
  return tx
    .select({
      patient: patients,
      stay: { startedAt: stays.startedAt },
      bed: { label: beds.label, sortOrder: beds.sortOrder },
      episode: { id: episodes.id, startedAt: episodes.startedAt, airway: episodes.airway },
      lastEndedAt: sql<number | null>`(select max(e.ended_at) from ${episodes} e where e.patient_id = ${patients.id})`,
    })
    .from(stays)
    .innerJoin(beds, eq(beds.id, stays.bedId))
    .innerJoin(patients, eq(patients.id, stays.patientId))
    .leftJoin(episodes, and(eq(episodes.patientId, patients.id), isNull(episodes.endedAt)))
    .where(and(eq(stays.unitId, unitId), isNull(stays.endedAt)))
    .orderBy(asc(beds.sortOrder))
    .all()
}
