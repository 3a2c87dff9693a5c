import { getTableName, sql } from 'drizzle-orm'
import { beforeEach, describe, expect, it, vi } from 'vitest'
import type { Db } from '@/db/client'
import { savePasswordHash } from '@/db/queries/sessions'
import {
  account,
  accountLinks,
  auditLog,
  beds,
  hospitals,
  idempotencyKeys,
  mailLedger,
  mailSchedules,
  memberships,
  people,
  protocolVersions,
  session,
  sessionStates,
  units,
  user,
} from '@/db/schema'
import { answerAuthRequest } from '@/lib/server/auth-route'
import { hashNewPassword, systemCtx } from '@/lib/server/auth'
import { findStanding } from '@/lib/server/session'
import { updateHospital } from '@/lib/services/hospital/update'
import { acceptLink } from '@/lib/services/people/accept'
import { deactivatePerson } from '@/lib/services/people/deactivate'
import { invitePerson } from '@/lib/services/people/invite'
import { reinvitePerson } from '@/lib/services/people/reinvite'
import { setRoles } from '@/lib/services/people/set-roles'
import { changePassword } from '@/lib/services/session/change-password'
import { endAllSessions } from '@/lib/services/session/end-all'
import { lockSession } from '@/lib/services/session/lock'
import { addBeds } from '@/lib/services/units/add-beds'
import { createUnit } from '@/lib/services/units/create'
import { retireBed } from '@/lib/services/units/retire-bed'
import { updateUnit } from '@/lib/services/units/update'
import { newId } from '@/lib/shared/ids'
import { makeCtx, makeWorld, NOW } from '../../helpers/factories'
import { cookieOf, makeRequest, makeSession, serveDatabase } from '../../helpers/test-server'

const TABLES = [
  account,
  accountLinks,
  auditLog,
  beds,
  hospitals,
  idempotencyKeys,
  mailLedger,
  mailSchedules,
  memberships,
  people,
  protocolVersions,
  session,
  sessionStates,
  units,
  user,
]
const PASSWORD = 'a long enough sentence'

// Each real password check costs 0.2 s, more on a busy machine.
vi.setConfig({ testTimeout: 60_000 })

let db: Db
let world: ReturnType<typeof makeWorld>
let hash: string | undefined

beforeEach(async () => {
  world = makeWorld()
  db = world.db
  serveDatabase(db)
  hash ??= await hashNewPassword(PASSWORD)
  savePasswordHash(db, { id: newId(), personId: world.administrator.id, hash, now: NOW })
})

/** From here on the audit log takes no row, as if the disk were full at that moment. */
const breakAuditLog = () =>
  db.run(
    sql.raw(
      `CREATE TRIGGER broken_audit BEFORE INSERT ON audit_log BEGIN SELECT RAISE(ABORT, 'no audit row can be written'); END`,
    ),
  )
const everything = () => Object.fromEntries(TABLES.map((table) => [getTableName(table), db.select().from(table).all()]))
const ctx = () => makeCtx(db, world.administrator, NOW, { idempotencyKey: newId() })
const unit = { name: 'X', timeZone: 'UTC', altitudeM: 0, barometricPressureMmHg: null }

describe('a change whose audit row cannot be written', () => {
  const verbs: [string, () => unknown][] = [
    [
      'inviting',
      () => invitePerson(ctx(), { name: 'Sasha', email: 's@example.invalid', isAdministrator: true, memberships: [] }),
    ],
    ['inviting again', () => reinvitePerson(ctx(), { personId: world.nurse.id, version: 1 })],
    ['setting roles', () => setRoles(ctx(), { personId: world.nurse.id, version: 1, isAdministrator: true, memberships: [] })],
    ['deactivating', () => deactivatePerson(ctx(), { personId: world.nurse.id, version: 1 })],
    ['creating a unit', () => createUnit(ctx(), { ...unit, bedLabels: ['X1'] })],
    [
      'changing a unit',
      () => updateUnit(ctx(), { ...unit, unitId: world.surgical.unit.id, version: 1, dayTrackFromHour: 4, dayTrackToHour: 20 }),
    ],
    ['adding beds', () => addBeds(ctx(), { unitId: world.medical.unit.id, bedLabels: ['X1'] })],
    ['retiring a bed', () => retireBed(ctx(), { bedId: world.medical.beds[1]?.id ?? '' })],
    ['changing the hospital', () => updateHospital(ctx(), { name: 'X', idleLockMin: 5, version: 1 })],
  ]
  it.each(verbs)('leaves nothing behind: %s', (_name, verb) => {
    const before = everything()
    breakAuditLog()
    expect(verb).toThrow('no audit row')
    expect(everything()).toEqual(before)
  })

  it('leaves nothing behind: accepting an invitation, and the link still works afterwards', async () => {
    invitePerson(ctx(), { name: 'Sasha', email: 's@example.invalid', isAdministrator: true, memberships: [] })
    const link = /https?:\/\/\S+/.exec(db.select().from(mailLedger).all()[0]?.bodyText ?? '')?.[0] ?? ''
    const token = new URL(link).searchParams.get('token') ?? ''
    const accept = () => acceptLink(systemCtx(db, NOW), { kind: 'invitation', token, password: PASSWORD })
    const before = everything()
    breakAuditLog()
    await expect(accept()).rejects.toThrow('no audit row')
    expect(everything()).toEqual(before)
    db.run(sql.raw('DROP TRIGGER broken_audit'))
    await expect(accept()).resolves.toEqual({ ok: true })
  })

  it('leaves nothing behind: locking, ending sessions, changing the password', async () => {
    const { sessionId } = makeSession(db, world.administrator.id)
    const own = { ...ctx(), actor: { ...ctx().actor, sessionId } }
    const before = everything()
    breakAuditLog()
    expect(() => lockSession(own)).toThrow('no audit row')
    expect(() => endAllSessions(own)).toThrow('no audit row')
    await expect(changePassword(own, { currentPassword: PASSWORD, newPassword: 'another long sentence' })).rejects.toThrow(
      'no audit row',
    )
    expect(everything()).toEqual(before)
  })

  it('signs nobody in', async () => {
    const email =
      db
        .select()
        .from(user)
        .all()
        .find((row) => row.id === world.administrator.id)?.email ?? ''
    breakAuditLog()
    const response = await answerAuthRequest(makeRequest('/api/auth/sign-in/email', { body: { email, password: PASSWORD } }))
    expect(response.status).toBe(500)
    expect(cookieOf(response)).toBeNull()
    for (const row of db.select().from(session).all())
      expect(
        db
          .select()
          .from(sessionStates)
          .all()
          .map((state) => state.sessionId),
      ).not.toContain(row.id)
    expect(findStanding(db, cookieOf(response), Date.now())).toBeNull()
  })
})
