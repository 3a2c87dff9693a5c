import 'server-only'
import { and, asc, eq, gt, inArray, isNull, lt, ne, notInArray, sql } from 'drizzle-orm'
import type { Db, Tx } from '../client'
import { account, hospitals, memberships, people, rateLimit, session, sessionStates, units, user, verification } from '../schema'

const prepare = (db: Db) => ({
  standing: db
    .select({
      sessionId: session.id,
      createdAt: session.createdAt,
      expiresAt: session.expiresAt,
      personId: people.id,
      name: people.name,
      hospitalId: people.hospitalId,
      isAdministrator: people.isAdministrator,
      deactivatedAt: people.deactivatedAt,
      lastActiveAt: sessionStates.lastActiveAt,
      lockedAt: sessionStates.lockedAt,
      idleLockMin: hospitals.idleLockMin,
    })
    .from(session)
    .innerJoin(sessionStates, eq(sessionStates.sessionId, session.id))
    .innerJoin(people, eq(people.id, session.userId))
    .innerJoin(hospitals, eq(hospitals.id, people.hospitalId))
    .where(eq(session.token, sql.placeholder('token')))
    .prepare(),
  memberships: db
    .select({ unitId: memberships.unitId, role: memberships.role })
    .from(memberships)
    .innerJoin(units, eq(units.id, memberships.unitId))
    .where(and(eq(memberships.personId, sql.placeholder('personId')), isNull(memberships.endedAt)))
    .orderBy(asc(units.name))
    .prepare(),
})

const prepared = new WeakMap<Db, ReturnType<typeof prepare>>()

/** The two statements that every request runs, prepared once for each database. */
function statements(db: Db) {
  const known = prepared.get(db)
  if (known) return known
  const made = prepare(db)
  prepared.set(db, made)
  return made
}

/** The session of a token with its person, hospital and lock state; undefined without a lock state row. */
export function findSessionStanding(db: Db, token: string) {
  return statements(db).standing.get({ token })
}

export function listMembershipsPrepared(db: Db, personId: string) {
  return statements(db).memberships.all({ personId })
}

export function findSessionState(tx: Tx, sessionId: string) {
  return tx.select().from(sessionStates).where(eq(sessionStates.sessionId, sessionId)).get()
}

export function insertSessionState(tx: Tx, row: typeof sessionStates.$inferInsert): void {
  tx.insert(sessionStates).values(row).run()
}

export function updateSessionState(
  tx: Tx,
  sessionId: string,
  change: Partial<Pick<typeof sessionStates.$inferInsert, 'lastActiveAt' | 'lockedAt' | 'failedUnlocks'>>,
): void {
  tx.update(sessionStates).set(change).where(eq(sessionStates.sessionId, sessionId)).run()
}

export function deleteSession(tx: Tx, sessionId: string): void {
  tx.delete(sessionStates).where(eq(sessionStates.sessionId, sessionId)).run()
  tx.delete(session).where(eq(session.id, sessionId)).run()
}

/** Ends the sessions of a person, all or all but one. Answers how many there were. */
export function deleteSessionsOf(tx: Tx, personId: string, exceptSessionId: string | null = null): number {
  const others = exceptSessionId === null ? undefined : ne(session.id, exceptSessionId)
  const ended = tx
    .delete(session)
    .where(and(eq(session.userId, personId), others))
    .run().changes
  const otherStates = exceptSessionId === null ? undefined : ne(sessionStates.sessionId, exceptSessionId)
  tx.delete(sessionStates)
    .where(and(eq(sessionStates.personId, personId), otherStates))
    .run()
  return ended
}

/** Removes what has run out: sessions, their states, reset tokens. */
export function deleteExpiredSessions(tx: Tx, now: number): void {
  tx.delete(session)
    .where(lt(session.expiresAt, new Date(now)))
    .run()
  tx.delete(sessionStates)
    .where(notInArray(sessionStates.sessionId, tx.select({ id: session.id }).from(session)))
    .run()
  tx.delete(verification)
    .where(lt(verification.expiresAt, new Date(now)))
    .run()
}

/** Hash of the password of an account; null when the person never set one. */
export function findPasswordHash(tx: Tx, personId: string): string | null {
  const row = tx
    .select({ password: account.password })
    .from(account)
    .where(and(eq(account.userId, personId), eq(account.providerId, 'credential')))
    .get()
  return row?.password ?? null
}

/** Which of these people have set a password. */
export function listPeopleWithPassword(tx: Tx, personIds: readonly string[]): Set<string> {
  const rows = tx
    .select({ userId: account.userId })
    .from(account)
    .where(
      and(inArray(account.userId, [...personIds]), eq(account.providerId, 'credential'), sql`${account.password} is not null`),
    )
    .all()
  return new Set(rows.map((row) => row.userId))
}

/** Sets the password hash of a person, whether there was one or not. */
export function savePasswordHash(tx: Tx, row: { id: string; personId: string; hash: string; now: number }): void {
  const changed = tx
    .update(account)
    .set({ password: row.hash, updatedAt: new Date(row.now) })
    .where(and(eq(account.userId, row.personId), eq(account.providerId, 'credential')))
    .run().changes
  if (changed > 0) return
  const at = new Date(row.now)
  tx.insert(account)
    .values({
      id: row.id,
      accountId: row.personId,
      providerId: 'credential',
      userId: row.personId,
      password: row.hash,
      createdAt: at,
      updatedAt: at,
    })
    .run()
}

export function deletePassword(tx: Tx, personId: string): void {
  tx.delete(account).where(eq(account.userId, personId)).run()
}

export function findUserByEmail(tx: Tx, email: string) {
  return tx.select().from(user).where(eq(user.email, email)).get()
}

export function findAllowance(tx: Tx, key: string) {
  return tx.select().from(rateLimit).where(eq(rateLimit.key, key)).get()
}

export function saveAllowance(tx: Tx, row: { id: string; key: string; count: number; lastRequest: number }): void {
  tx.insert(rateLimit)
    .values(row)
    .onConflictDoUpdate({ target: rateLimit.key, set: { count: row.count, lastRequest: row.lastRequest } })
    .run()
}

export function deleteAllowance(tx: Tx, key: string): void {
  tx.delete(rateLimit).where(eq(rateLimit.key, key)).run()
}

export function deleteAllowancesBefore(tx: Tx, before: number): void {
  tx.delete(rateLimit).where(lt(rateLimit.lastRequest, before)).run()
}

/** Sessions of a person that have not run out. */
export function countOpenSessions(tx: Tx, personId: string, now: number): number {
  return tx
    .select({ id: session.id })
    .from(session)
    .where(and(eq(session.userId, personId), gt(session.expiresAt, new Date(now))))
    .all().length
}
