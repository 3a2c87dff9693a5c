import 'server-only'
import { and, asc, eq, inArray, isNull, max } from 'drizzle-orm'
import type { Tx } from '../client'
import { beds, hospitals, mailSchedules, protocolVersions, stays, units } from '../schema'

export type HospitalRow = typeof hospitals.$inferSelect

export function findHospital(tx: Tx, hospitalId: string): HospitalRow | undefined {
  return tx.select().from(hospitals).where(eq(hospitals.id, hospitalId)).get()
}

export function insertHospital(tx: Tx, row: typeof hospitals.$inferInsert): void {
  tx.insert(hospitals).values(row).run()
}

/** Changes a hospital at a known version. False when somebody else changed it meanwhile. */
export function updateHospitalRow(
  tx: Tx,
  hospitalId: string,
  version: number,
  change: { name: string; idleLockMin: number },
): boolean {
  return (
    tx
      .update(hospitals)
      .set({ ...change, version: version + 1 })
      .where(and(eq(hospitals.id, hospitalId), eq(hospitals.version, version)))
      .run().changes === 1
  )
}

export function listUnitsOfHospital(tx: Tx, hospitalId: string) {
  return tx
    .select()
    .from(units)
    .where(and(eq(units.hospitalId, hospitalId), isNull(units.retiredAt)))
    .orderBy(asc(units.name), asc(units.id))
    .all()
}

export function findUnitOfHospital(tx: Tx, unitId: string, hospitalId: string) {
  return tx
    .select()
    .from(units)
    .where(and(eq(units.id, unitId), eq(units.hospitalId, hospitalId), isNull(units.retiredAt)))
    .get()
}

export function insertUnit(tx: Tx, row: typeof units.$inferInsert): void {
  tx.insert(units).values(row).run()
}

/** Changes a unit at a known version. False when somebody else changed it meanwhile. */
export function updateUnitRow(tx: Tx, unitId: string, version: number, change: Partial<typeof units.$inferInsert>): boolean {
  return (
    tx
      .update(units)
      .set({ ...change, version: version + 1 })
      .where(and(eq(units.id, unitId), eq(units.version, version)))
      .run().changes === 1
  )
}

export function listBedsOf(tx: Tx, unitIds: readonly string[]) {
  return tx
    .select()
    .from(beds)
    .where(inArray(beds.unitId, [...unitIds]))
    .orderBy(asc(beds.sortOrder), asc(beds.label))
    .all()
}

export function findBedOfHospital(tx: Tx, bedId: string, hospitalId: string) {
  return tx
    .select({ id: beds.id, unitId: beds.unitId, label: beds.label, retiredAt: beds.retiredAt })
    .from(beds)
    .innerJoin(units, eq(units.id, beds.unitId))
    .where(and(eq(beds.id, bedId), eq(units.hospitalId, hospitalId)))
    .get()
}

export function insertBeds(tx: Tx, rows: (typeof beds.$inferInsert)[]): void {
  tx.insert(beds).values(rows).run()
}

export function findLastBedOrder(tx: Tx, unitId: string): number {
  return (
    tx
      .select({ last: max(beds.sortOrder) })
      .from(beds)
      .where(eq(beds.unitId, unitId))
      .get()?.last ?? 0
  )
}

export function setBedRetired(tx: Tx, bedId: string, retiredAt: number | null): void {
  tx.update(beds).set({ retiredAt }).where(eq(beds.id, bedId)).run()
}

export function isBedTaken(tx: Tx, bedId: string): boolean {
  return (
    tx
      .select({ id: stays.id })
      .from(stays)
      .where(and(eq(stays.bedId, bedId), isNull(stays.endedAt)))
      .limit(1)
      .get() !== undefined
  )
}

/** Whether the unit ever had a patient: from then on its calendar days are fixed. */
export function hasAnyStay(tx: Tx, unitId: string): boolean {
  return tx.select({ id: stays.id }).from(stays).where(eq(stays.unitId, unitId)).limit(1).get() !== undefined
}

export function insertFirstProtocol(tx: Tx, row: typeof protocolVersions.$inferInsert): void {
  tx.insert(protocolVersions).values(row).run()
}

export function insertMailSchedule(tx: Tx, row: typeof mailSchedules.$inferInsert): void {
  tx.insert(mailSchedules).values(row).run()
}
