import 'server-only'
import { and, desc, eq, gt, isNull, lte, or } from 'drizzle-orm'
import type { Tx } from '../client'
import { beds, stays, units } from '../schema'

/** The unit that a patient was in at a moment; undefined when in none. */
export function findUnitAt(tx: Tx, patientId: string, at: number) {
  return tx
    .select({ unit: units })
    .from(stays)
    .innerJoin(units, eq(units.id, stays.unitId))
    .where(and(eq(stays.patientId, patientId), lte(stays.startedAt, at), or(isNull(stays.endedAt), gt(stays.endedAt, at))))
    .orderBy(desc(stays.startedAt))
    .limit(1)
    .get()?.unit
}

export function findOpenStay(tx: Tx, patientId: string) {
  return tx
    .select()
    .from(stays)
    .where(and(eq(stays.patientId, patientId), isNull(stays.endedAt)))
    .limit(1)
    .get()
}

/** A stay in the bed that still runs, or that ended only after the given moment; the latest one. */
export function findOccupationSince(tx: Tx, bedId: string, at: number) {
  return tx
    .select()
    .from(stays)
    .where(and(eq(stays.bedId, bedId), or(isNull(stays.endedAt), gt(stays.endedAt, at))))
    .orderBy(desc(stays.startedAt))
    .limit(1)
    .get()
}

/** The stay of a patient that ended last. */
export function findLastEndedStay(tx: Tx, patientId: string) {
  return tx
    .select()
    .from(stays)
    .where(and(eq(stays.patientId, patientId), gt(stays.endedAt, 0)))
    .orderBy(desc(stays.endedAt))
    .limit(1)
    .get()
}

/** A bed in use of a unit. */
export function findBedInUse(tx: Tx, bedId: string, unitId: string) {
  return tx
    .select()
    .from(beds)
    .where(and(eq(beds.id, bedId), eq(beds.unitId, unitId), isNull(beds.retiredAt)))
    .get()
}

export function insertStay(tx: Tx, row: typeof stays.$inferInsert) {
  return tx.insert(stays).values(row).returning().get()
}

/** Ends a stay that still runs. Undefined when it was ended meanwhile. */
export function endStayRow(
  tx: Tx,
  stay: { id: string; version: number },
  end: { endedAt: number; end: 'moved' | 'left_unit' | 'died' },
) {
  return tx
    .update(stays)
    .set({ ...end, version: stay.version + 1 })
    .where(and(eq(stays.id, stay.id), eq(stays.version, stay.version), isNull(stays.endedAt)))
    .returning()
    .get()
}
