import 'server-only'
import { desc, eq } from 'drizzle-orm'
import type { Tx } from '../client'
import { patients, people, recordOpenings } from '../schema'

export function insertOpening(tx: Tx, row: typeof recordOpenings.$inferInsert) {
  return tx.insert(recordOpenings).values(row).returning().get()
}

/** The latest openings of a unit's records, newest first. */
export function listOpeningsOfUnit(tx: Tx, unitId: string, limit: number) {
  return tx
    .select({
      opening: recordOpenings,
      personName: people.name,
      patient: {
        id: patients.id,
        familyName: patients.familyName,
        givenName: patients.givenName,
        recordNumber: patients.recordNumber,
      },
    })
    .from(recordOpenings)
    .innerJoin(people, eq(people.id, recordOpenings.personId))
    .innerJoin(patients, eq(patients.id, recordOpenings.patientId))
    .where(eq(recordOpenings.unitId, unitId))
    .orderBy(desc(recordOpenings.openedAt))
    .limit(limit)
    .all()
}
