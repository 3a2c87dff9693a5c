import 'server-only'
import { and, asc, eq, gt, inArray, isNotNull, isNull, ne, sql } from 'drizzle-orm'
import type { Tx } from '../client'
import { account, accountLinks, hospitals, memberships, people, units, user } from '../schema'

export type PersonRow = typeof people.$inferSelect
export type AccountLinkRow = typeof accountLinks.$inferSelect

const personColumns = {
  id: people.id,
  name: people.name,
  email: user.email,
  isAdministrator: people.isAdministrator,
  deactivatedAt: people.deactivatedAt,
  version: people.version,
}

export function listPeopleOfHospital(tx: Tx, hospitalId: string) {
  return tx
    .select(personColumns)
    .from(people)
    .innerJoin(user, eq(user.id, people.id))
    .where(eq(people.hospitalId, hospitalId))
    .orderBy(asc(people.name), asc(people.id))
    .all()
}

export function findPersonOfHospital(tx: Tx, personId: string, hospitalId: string) {
  return tx
    .select(personColumns)
    .from(people)
    .innerJoin(user, eq(user.id, people.id))
    .where(and(eq(people.id, personId), eq(people.hospitalId, hospitalId)))
    .get()
}

/** Roles held now by these people, with the name of the unit. */
export function listMembershipsOf(tx: Tx, personIds: readonly string[]) {
  return tx
    .select({
      id: memberships.id,
      personId: memberships.personId,
      unitId: memberships.unitId,
      unitName: units.name,
      timeZone: units.timeZone,
      role: memberships.role,
    })
    .from(memberships)
    .innerJoin(units, eq(units.id, memberships.unitId))
    .where(and(inArray(memberships.personId, [...personIds]), isNull(memberships.endedAt)))
    .orderBy(asc(units.name), asc(memberships.role))
    .all()
}

export function insertPerson(
  tx: Tx,
  row: { id: string; hospitalId: string; name: string; email: string; isAdministrator: boolean; now: number },
): void {
  const at = new Date(row.now)
  tx.insert(user)
    .values({ id: row.id, name: row.name, email: row.email, emailVerified: false, createdAt: at, updatedAt: at })
    .run()
  tx.insert(people)
    .values({
      id: row.id,
      hospitalId: row.hospitalId,
      name: row.name,
      isAdministrator: row.isAdministrator,
      createdAt: row.now,
    })
    .run()
}

/** Changes a person at a known version. False when somebody else changed it meanwhile. */
export function updatePerson(
  tx: Tx,
  personId: string,
  version: number,
  change: { isAdministrator?: boolean; deactivatedAt?: number | null },
): boolean {
  return (
    tx
      .update(people)
      .set({ ...change, version: version + 1 })
      .where(and(eq(people.id, personId), eq(people.version, version)))
      .run().changes === 1
  )
}

export function markEmailVerified(tx: Tx, personId: string, now: number): void {
  tx.update(user)
    .set({ emailVerified: true, updatedAt: new Date(now) })
    .where(eq(user.id, personId))
    .run()
}

export function insertMembership(tx: Tx, row: typeof memberships.$inferInsert): void {
  tx.insert(memberships).values(row).run()
}

export function endMemberships(tx: Tx, ids: readonly string[], now: number): void {
  tx.update(memberships)
    .set({ endedAt: now })
    .where(inArray(memberships.id, [...ids]))
    .run()
}

/** Administrators other than this one who can act: not deactivated, and with a password of their own. */
export function countOtherAdministrators(tx: Tx, hospitalId: string, personId: string): number {
  const row = tx
    .select({ count: sql<number>`count(distinct ${people.id})` })
    .from(people)
    .innerJoin(account, and(eq(account.userId, people.id), eq(account.providerId, 'credential'), isNotNull(account.password)))
    .where(
      and(
        eq(people.hospitalId, hospitalId),
        ne(people.id, personId),
        eq(people.isAdministrator, true),
        isNull(people.deactivatedAt),
      ),
    )
    .get()
  return row?.count ?? 0
}

export function insertAccountLink(tx: Tx, row: typeof accountLinks.$inferInsert): void {
  tx.insert(accountLinks).values(row).run()
}

export function findAccountLink(tx: Tx, tokenHash: string): AccountLinkRow | undefined {
  return tx.select().from(accountLinks).where(eq(accountLinks.tokenHash, tokenHash)).get()
}

/** Uses up a link. False when it was used, ran out, or was replaced meanwhile. */
export function consumeAccountLink(tx: Tx, linkId: string, now: number): boolean {
  return (
    tx
      .update(accountLinks)
      .set({ usedAt: now })
      .where(and(eq(accountLinks.id, linkId), isNull(accountLinks.usedAt), gt(accountLinks.expiresAt, now)))
      .run().changes === 1
  )
}

/** Ends the open links of a person, or the open set-up links when the person is null. */
export function expireAccountLinks(tx: Tx, personId: string | null, now: number): void {
  const whose = personId === null ? eq(accountLinks.kind, 'setup') : eq(accountLinks.personId, personId)
  tx.update(accountLinks)
    .set({ expiresAt: now })
    .where(and(whose, isNull(accountLinks.usedAt), gt(accountLinks.expiresAt, now)))
    .run()
}

export function listOpenLinksOf(tx: Tx, personIds: readonly string[], now: number) {
  return tx
    .select({ personId: accountLinks.personId, expiresAt: accountLinks.expiresAt })
    .from(accountLinks)
    .where(and(inArray(accountLinks.personId, [...personIds]), isNull(accountLinks.usedAt), gt(accountLinks.expiresAt, now)))
    .all()
}

export function hasAnyHospital(tx: Tx): boolean {
  return tx.select({ id: hospitals.id }).from(hospitals).limit(1).get() !== undefined
}
