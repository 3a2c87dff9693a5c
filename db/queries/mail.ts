import 'server-only'
import { and, asc, desc, eq, inArray, isNull, lt, lte } from 'drizzle-orm'
import type { ClinicalRole, MailKind } from '@/lib/weaning/vocabulary'
import type { Tx } from '../client'
import { mailLedger, mailSchedules, memberships, people, units, user } from '../schema'

export type MailRow = typeof mailLedger.$inferSelect

/** Queues a message unless one with the same once-key exists. True when it was queued. */
export function insertMailOnce(tx: Tx, row: typeof mailLedger.$inferInsert): boolean {
  return tx.insert(mailLedger).values(row).onConflictDoNothing({ target: mailLedger.onceKey }).run().changes === 1
}

/** Whether the ledger already holds any message of a kind for a unit's day. */
export function hasMailOfDay(tx: Tx, unitId: string, kind: MailKind, day: string): boolean {
  return (
    tx
      .select({ id: mailLedger.id })
      .from(mailLedger)
      .where(and(eq(mailLedger.unitId, unitId), eq(mailLedger.kind, kind), eq(mailLedger.day, day)))
      .limit(1)
      .get() !== undefined
  )
}

export function findMail(tx: Tx, id: string): MailRow | undefined {
  return tx.select().from(mailLedger).where(eq(mailLedger.id, id)).get()
}

/** The oldest message that is due to be sent. */
export function findNextQueuedMail(tx: Tx, now: number): MailRow | undefined {
  return tx
    .select()
    .from(mailLedger)
    .where(and(eq(mailLedger.state, 'queued'), lte(mailLedger.nextAttemptAt, now)))
    .orderBy(asc(mailLedger.nextAttemptAt), asc(mailLedger.queuedAt))
    .limit(1)
    .get()
}

/** Messages that were claimed before a moment and never confirmed: their process died in between. */
export function listStaleClaims(tx: Tx, claimedBefore: number): MailRow[] {
  return tx
    .select()
    .from(mailLedger)
    .where(and(eq(mailLedger.state, 'sending'), lt(mailLedger.claimedAt, claimedBefore)))
    .all()
}

/** Moves a message on, only when it is still in the state it was read in. True when it was. */
export function updateMail(tx: Tx, row: Pick<MailRow, 'id' | 'state' | 'attempts'>, change: Partial<MailRow>): boolean {
  return (
    tx
      .update(mailLedger)
      .set(change)
      .where(and(eq(mailLedger.id, row.id), eq(mailLedger.state, row.state), eq(mailLedger.attempts, row.attempts)))
      .run().changes === 1
  )
}

export function listMailOfUnit(tx: Tx, unitId: string, limit: number) {
  return tx
    .select({ mail: mailLedger, personName: people.name })
    .from(mailLedger)
    .leftJoin(people, eq(people.id, mailLedger.personId))
    .where(eq(mailLedger.unitId, unitId))
    .orderBy(desc(mailLedger.queuedAt))
    .limit(limit)
    .all()
}

/** Active members of a unit who hold one of the roles, once each, with the address they sign in with. */
export function listMailRecipients(tx: Tx, unitId: string, roles: readonly ClinicalRole[]) {
  return tx
    .selectDistinct({ personId: people.id, email: user.email })
    .from(memberships)
    .innerJoin(people, eq(people.id, memberships.personId))
    .innerJoin(user, eq(user.id, people.id))
    .where(
      and(
        eq(memberships.unitId, unitId),
        inArray(memberships.role, [...roles]),
        isNull(memberships.endedAt),
        isNull(people.deactivatedAt),
      ),
    )
    .all()
}

export function findMailSchedule(tx: Tx, unitId: string) {
  return tx.select().from(mailSchedules).where(eq(mailSchedules.unitId, unitId)).get()
}

/** Every unit in use with its schedule; the schedule is null for a unit that has none. */
export function listUnitsWithSchedule(tx: Tx) {
  return tx
    .select({ unit: units, schedule: mailSchedules })
    .from(units)
    .leftJoin(mailSchedules, eq(mailSchedules.unitId, units.id))
    .where(isNull(units.retiredAt))
    .orderBy(asc(units.id))
    .all()
}

/** Saves the schedule when the version is still the one that was read. True when it was. */
export function updateMailSchedule(
  tx: Tx,
  unitId: string,
  version: number,
  change: Pick<typeof mailSchedules.$inferInsert, 'morningDueMin' | 'isWindowEndOn' | 'isDecisionOwedOn'>,
): boolean {
  return (
    tx
      .update(mailSchedules)
      .set({ ...change, version: version + 1 })
      .where(and(eq(mailSchedules.unitId, unitId), eq(mailSchedules.version, version)))
      .run().changes === 1
  )
}

export function insertMailSchedule(tx: Tx, row: typeof mailSchedules.$inferInsert): void {
  tx.insert(mailSchedules).values(row).run()
}
