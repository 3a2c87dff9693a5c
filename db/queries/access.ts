import 'server-only'
import { and, desc, eq, gt, isNull, sql } from 'drizzle-orm'
import type { Tx } from '../client'
import { episodes, memberships, patients, people, recordOpenings, stays, units } from '../schema'
import { isOneOf } from './current'
import { preparedOnce } from './prepared'

/** The latest stay of a patient tells whose patient it is: the open one, else the one that ended last. */
export function findLatestStay(tx: Tx, patientId: string) {
  return tx
    .select()
    .from(stays)
    .where(eq(stays.patientId, patientId))
    .orderBy(sql`${stays.endedAt} is not null`, desc(stays.startedAt))
    .limit(1)
    .get()
}

export function findPatientOfHospital(tx: Tx, patientId: string, hospitalId: string) {
  return tx
    .select()
    .from(patients)
    .where(and(eq(patients.id, patientId), eq(patients.hospitalId, hospitalId)))
    .get()
}

export function findEpisode(tx: Tx, episodeId: string) {
  return tx.select().from(episodes).where(eq(episodes.id, episodeId)).get()
}

const unitAmong = preparedOnce((tx) =>
  tx
    .select()
    .from(units)
    .where(
      and(
        eq(units.id, sql.placeholder('unitId')),
        eq(units.hospitalId, sql.placeholder('hospitalId')),
        isOneOf(units.id, sql`${sql.placeholder('unitIds')}`),
      ),
    )
    .prepare(),
)

/** A unit, if it belongs to the hospital and is one of those given. */
export function findUnitAmong(tx: Tx, unitId: string, hospitalId: string, unitIds: readonly string[]) {
  return unitAmong(tx).get({ unitId, hospitalId, unitIds: JSON.stringify(unitIds) })
}

export function findUnit(tx: Tx, unitId: string) {
  return tx.select().from(units).where(eq(units.id, unitId)).get()
}

export function findValidOpening(tx: Tx, personId: string, patientId: string, now: number) {
  return tx
    .select()
    .from(recordOpenings)
    .where(and(eq(recordOpenings.personId, personId), eq(recordOpenings.patientId, patientId), gt(recordOpenings.expiresAt, now)))
    .limit(1)
    .get()
}

export function findPerson(tx: Tx, personId: string) {
  return tx.select().from(people).where(eq(people.id, personId)).get()
}

export function listOpenMemberships(tx: Tx, personId: string) {
  return tx
    .select({ unitId: memberships.unitId, role: memberships.role })
    .from(memberships)
    .where(and(eq(memberships.personId, personId), isNull(memberships.endedAt)))
    .all()
}
