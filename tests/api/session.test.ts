import { eq } from 'drizzle-orm'
import { beforeEach, describe, expect, it, vi } from 'vitest'
import type { Db } from '@/db/client'
import { savePasswordHash } from '@/db/queries/sessions'
import { auditLog, hospitals, idempotencyKeys, memberships, people, session, sessionStates } from '@/db/schema'
import { GET as readMe } from '@/app/api/me/route'
import { POST as changePassword } from '@/app/api/me/password/route'
import { POST as endAll } from '@/app/api/session/end-all/route'
import { POST as lock } from '@/app/api/session/lock/route'
import { POST as unlock } from '@/app/api/session/unlock/route'
import { GET as listPeople } from '@/app/api/admin/people/route'
import { hashNewPassword, isPasswordOf, verifyOwnPassword } from '@/lib/server/auth'
import { findStanding, requireActor } from '@/lib/server/session'
import { AppError } from '@/lib/shared/errors'
import { newId } from '@/lib/shared/ids'
import { MINUTE_MS } from '@/lib/shared/time'
import { makeCtx, makeHospital, makePerson, makeUnit, type TestPerson } from '../helpers/factories'
import { openTestDatabase } from '../helpers/database'
import { makeRequest, makeSession, routeParams, serveDatabase } from '../helpers/test-server'

const PASSWORD = 'a long enough sentence'

// Each real password check costs 0.2 s, more on a busy machine.
vi.setConfig({ testTimeout: 60_000 })

let db: Db
let rowan: TestPerson
let hash: string | undefined

beforeEach(async () => {
  db = openTestDatabase()
  serveDatabase(db)
  hash ??= await hashNewPassword(PASSWORD)
  rowan = makePerson(db, makeHospital(db, { idleLockMin: 15 }).id, [], { isAdministrator: true })
  savePasswordHash(db, { id: newId(), personId: rowan.id, hash, now: Date.now() })
})

const audited = (action: string) => db.select().from(auditLog).where(eq(auditLog.action, action)).all()
const codeOf = async (response: Response) => ((await response.json()) as { code?: string }).code ?? 'OK'
const send = (route: typeof lock, cookie: string, body: unknown = {}) =>
  route(makeRequest('/api/x', { cookie, body }), routeParams())
const fetchPeople = (cookie?: string, headers: Record<string, string> = {}) =>
  listPeople(makeRequest('/api/admin/people', { method: 'GET', ...(cookie ? { cookie } : {}), headers }), routeParams())

describe('the session check', () => {
  it('answers unauthenticated without a cookie, with a forged signature, with another secret, and with nonsense', async () => {
    const { cookie } = makeSession(db, rowan.id)
    const token = decodeURIComponent(cookie.split('=')[1] ?? '').split('.')[0] ?? ''
    const forged = `daybreath.session_token=${encodeURIComponent(`${token}.${Buffer.alloc(32).toString('base64')}`)}`
    const wrongName = cookie.replace('daybreath.session_token', 'other.session_token')
    for (const bad of [
      undefined,
      forged,
      wrongName,
      'daybreath.session_token=%E0%A4%A',
      'daybreath.session_token=',
      `daybreath.session_token=${token}`,
    ]) {
      expect(await codeOf(await fetchPeople(bad)), String(bad)).toBe('UNAUTHENTICATED')
    }
    expect((await fetchPeople(cookie)).status).toBe(200)
  })

  it('finds its cookie among others', async () => {
    const { cookie } = makeSession(db, rowan.id)
    expect((await fetchPeople(`theme=day; xdaybreath.session_token=1; ${cookie}; last=1`)).status).toBe(200)
  })

  it('ends 12 hours after sign-in however active the person is', () => {
    const createdAt = Date.now()
    const { cookie } = makeSession(db, rowan.id, { createdAt, lastActiveAt: createdAt + 12 * 60 * MINUTE_MS })
    expect(findStanding(db, cookie, createdAt + 12 * 60 * MINUTE_MS - 1)).not.toBeNull()
    expect(findStanding(db, cookie, createdAt + 12 * 60 * MINUTE_MS)).toBeNull()
  })

  it('shuts out a deactivated person and a session without a state row at once', async () => {
    const first = makeSession(db, rowan.id)
    const second = makeSession(db, rowan.id)
    db.delete(sessionStates).where(eq(sessionStates.sessionId, second.sessionId)).run()
    expect(await codeOf(await fetchPeople(second.cookie))).toBe('UNAUTHENTICATED')
    db.update(people).set({ deactivatedAt: Date.now() }).where(eq(people.id, rowan.id)).run()
    expect(await codeOf(await fetchPeople(first.cookie))).toBe('UNAUTHENTICATED')
  })

  it('reads roles anew on each request and leaves out those that ended', async () => {
    const { unit } = makeUnit(db, rowan.hospitalId)
    const nurse = makePerson(db, rowan.hospitalId, [{ unitId: unit.id, role: 'nurse' }])
    const { cookie } = makeSession(db, nurse.id)
    expect(findStanding(db, cookie, Date.now())?.actor.memberships).toEqual([{ unitId: unit.id, role: 'nurse' }])
    db.update(memberships).set({ endedAt: Date.now() }).run()
    expect(findStanding(db, cookie, Date.now())?.actor.memberships).toEqual([])
  })
})

describe('the idle lock', () => {
  it('opens at exactly the limit and locks a moment later', () => {
    const now = Date.now()
    const { cookie } = makeSession(db, rowan.id, { createdAt: now - 60 * MINUTE_MS, lastActiveAt: now - 15 * MINUTE_MS })
    expect(findStanding(db, cookie, now)?.isLocked).toBe(false)
    expect(findStanding(db, cookie, now + 1)?.isLocked).toBe(true)
  })

  it('follows the minutes that the hospital has set', () => {
    db.update(hospitals).set({ idleLockMin: 2 }).run()
    const now = Date.now()
    const { cookie } = makeSession(db, rowan.id, { lastActiveAt: now - 2 * MINUTE_MS - 1 })
    expect(findStanding(db, cookie, now)?.isLocked).toBe(true)
  })

  it('answers 423 at a locked screen, but still says who is signed in', async () => {
    const { cookie } = makeSession(db, rowan.id, { lockedAt: Date.now() })
    expect((await fetchPeople(cookie)).status).toBe(423)
    expect((await send(endAll, cookie)).status).toBe(423)
    expect((await send(changePassword, cookie, { currentPassword: PASSWORD, newPassword: 'another long sentence' })).status).toBe(
      423,
    )
    const me = await readMe(makeRequest('/api/me', { method: 'GET', cookie }), routeParams())
    expect(await me.json()).toMatchObject({ name: rowan.name, isLocked: true, idleLockMin: 15 })
  })

  it('counts a request as activity only when a person caused it, and writes it at most every 30 s', async () => {
    const { cookie, sessionId } = makeSession(db, rowan.id, { lastActiveAt: Date.now() - 5 * MINUTE_MS })
    const lastActiveAt = () =>
      db.select().from(sessionStates).where(eq(sessionStates.sessionId, sessionId)).get()?.lastActiveAt ?? 0
    const before = lastActiveAt()
    await fetchPeople(cookie)
    expect(lastActiveAt()).toBe(before)
    await fetchPeople(cookie, { 'x-daybreath-active': '1' })
    const after = lastActiveAt()
    expect(Date.now() - after).toBeLessThan(5_000)
    await fetchPeople(cookie, { 'x-daybreath-active': '1' })
    expect(lastActiveAt()).toBe(after)
  })

  it('does not let activity open a screen that is locked', async () => {
    const { cookie } = makeSession(db, rowan.id, { lastActiveAt: Date.now() - 20 * MINUTE_MS })
    expect((await fetchPeople(cookie, { 'x-daybreath-active': '1' })).status).toBe(423)
    expect((await fetchPeople(cookie)).status).toBe(423)
  })

  it('lets only the named callers past a lock', async () => {
    const { cookie } = makeSession(db, rowan.id, { lockedAt: 1 })
    const request = makeRequest('/api/x', { cookie })
    await expect(requireActor(request)).rejects.toMatchObject({ code: 'LOCKED' })
    await expect(requireActor(request, { evenLocked: true })).resolves.toMatchObject({ personId: rowan.id })
  })
})

describe('lock and unlock', () => {
  it('locks at once, writes one audit row, and changes nothing when locked again', async () => {
    const { cookie } = makeSession(db, rowan.id)
    expect((await send(lock, cookie)).status).toBe(200)
    expect((await send(lock, cookie)).status).toBe(200)
    expect((await fetchPeople(cookie)).status).toBe(423)
    expect(audited('session.lock')).toHaveLength(1)
  })

  it('unlocks with the password and starts the idle time anew', async () => {
    const { cookie } = makeSession(db, rowan.id, { lockedAt: 1, lastActiveAt: 1 })
    expect((await send(unlock, cookie, { password: PASSWORD })).status).toBe(200)
    expect((await fetchPeople(cookie)).status).toBe(200)
    expect(audited('session.unlock').map((row) => [row.actorId, row.subjectId])).toEqual([[rowan.id, rowan.id]])
  })

  it('says at the field how many tries are left, and ends the session with the fifth wrong one', async () => {
    const { cookie } = makeSession(db, rowan.id, { lockedAt: Date.now() })
    const answers = []
    for (let tries = 0; tries < 5; tries += 1) answers.push(await send(unlock, cookie, { password: 'wrong' }))
    expect(answers.map((answer) => answer.status)).toEqual([422, 422, 422, 422, 401])
    expect(await answers[3]?.json()).toMatchObject({ fields: { password: expect.stringContaining('One try is left') } })
    expect(db.select().from(session).all()).toEqual([])
    expect((await send(unlock, cookie, { password: PASSWORD })).status).toBe(401)
    expect([audited('session.unlock_failed').length, audited('session.ended_by_wrong_passwords').length]).toEqual([4, 1])
  })

  it('counts wrong passwords that come at the same moment', async () => {
    const { cookie } = makeSession(db, rowan.id, { lockedAt: Date.now() })
    const answers = await Promise.all(Array.from({ length: 9 }, () => send(unlock, cookie, { password: 'wrong' })))
    expect(answers.filter((answer) => answer.status === 422)).toHaveLength(4)
    expect(db.select().from(session).all()).toEqual([])
  })

  it('forgets earlier wrong ones after a right one', async () => {
    const { cookie } = makeSession(db, rowan.id, { lockedAt: Date.now() })
    for (let tries = 0; tries < 4; tries += 1) await send(unlock, cookie, { password: 'wrong' })
    await send(unlock, cookie, { password: PASSWORD })
    for (let tries = 0; tries < 4; tries += 1) expect((await send(unlock, cookie, { password: 'wrong' })).status).toBe(422)
  })

  it('does not open with the password of somebody else', async () => {
    const other = makePerson(db, rowan.hospitalId)
    savePasswordHash(db, {
      id: newId(),
      personId: other.id,
      hash: await hashNewPassword('the password of another'),
      now: Date.now(),
    })
    const { cookie } = makeSession(db, rowan.id, { lockedAt: Date.now() })
    expect((await send(unlock, cookie, { password: 'the password of another' })).status).toBe(422)
  })

  it('refuses to unlock from a foreign page', async () => {
    const { cookie } = makeSession(db, rowan.id, { lockedAt: Date.now() })
    const request = makeRequest('/api/session/unlock', {
      cookie,
      body: { password: PASSWORD },
      headers: { origin: 'https://elsewhere.invalid' },
    })
    expect((await unlock(request, routeParams())).status).toBe(403)
    expect((await fetchPeople(cookie)).status).toBe(423)
  })
})

describe('signing out everywhere', () => {
  it('ends every session of the person and nobody else’s', async () => {
    const other = makePerson(db, rowan.hospitalId)
    const kept = makeSession(db, other.id)
    const first = makeSession(db, rowan.id)
    const second = makeSession(db, rowan.id)
    expect(await (await send(endAll, first.cookie)).json()).toEqual({ ended: 2 })
    expect(await codeOf(await fetchPeople(second.cookie))).toBe('UNAUTHENTICATED')
    expect(
      db
        .select()
        .from(session)
        .all()
        .map((row) => row.id),
    ).toEqual([kept.sessionId])
    expect(
      db
        .select()
        .from(sessionStates)
        .all()
        .map((row) => row.sessionId),
    ).toEqual([kept.sessionId])
    expect(audited('session.end_all').map((row) => row.after)).toEqual([{ ended: 2 }])
  })
})

describe('changing the password', () => {
  it('replaces it, keeps this session, ends the others, and keeps no trace of either password', async () => {
    const here = makeSession(db, rowan.id)
    const elsewhere = makeSession(db, rowan.id)
    const request = makeRequest('/api/me/password', {
      cookie: here.cookie,
      body: { currentPassword: PASSWORD, newPassword: 'another long sentence' },
      headers: { 'idempotency-key': 'k1' },
    })
    expect(await (await changePassword(request, routeParams())).json()).toEqual({ otherSessionsEnded: 1 })
    expect([await isPasswordOf(db, rowan.id, PASSWORD), await isPasswordOf(db, rowan.id, 'another long sentence')]).toEqual([
      false,
      true,
    ])
    expect((await fetchPeople(here.cookie)).status).toBe(200)
    expect((await fetchPeople(elsewhere.cookie)).status).toBe(401)
    expect(audited('password.change')).toHaveLength(1)
    expect(JSON.stringify(db.select().from(auditLog).all())).not.toContain('sentence')
    expect(db.select().from(idempotencyKeys).all()).toEqual([])
  })

  it('refuses a wrong present password, a short new one, and the same one again; nothing changes', async () => {
    const { cookie } = makeSession(db, rowan.id)
    const wrong = await send(changePassword, cookie, { currentPassword: 'wrong', newPassword: 'another long sentence' })
    expect(await wrong.json()).toMatchObject({ fields: { currentPassword: expect.any(String) } })
    const short = await send(changePassword, cookie, { currentPassword: PASSWORD, newPassword: 'short' })
    expect(await short.json()).toMatchObject({ fields: { newPassword: expect.stringContaining('12') } })
    const same = await send(changePassword, cookie, { currentPassword: PASSWORD, newPassword: PASSWORD })
    expect(await same.json()).toMatchObject({ fields: { newPassword: expect.stringContaining('differs') } })
    expect(await isPasswordOf(db, rowan.id, PASSWORD)).toBe(true)
  })
})

describe('the password asked for again before signing', () => {
  it('is right or wrong, and a wrong one stands in the audit log', async () => {
    const ctx = makeCtx(db, rowan, Date.now())
    expect(await verifyOwnPassword(ctx, PASSWORD)).toBe(true)
    expect(await verifyOwnPassword(ctx, 'wrong')).toBe(false)
    expect(audited('password.wrong').map((row) => row.subjectId)).toEqual([rowan.id])
  })

  it('waits 15 min after five wrong tries, also for the right one', async () => {
    const now = Date.now()
    for (let tries = 0; tries < 5; tries += 1) expect(await verifyOwnPassword(makeCtx(db, rowan, now), 'wrong')).toBe(false)
    await expect(verifyOwnPassword(makeCtx(db, rowan, now + 14 * MINUTE_MS), PASSWORD)).rejects.toBeInstanceOf(AppError)
    await expect(verifyOwnPassword(makeCtx(db, rowan, now + 14 * MINUTE_MS), PASSWORD)).rejects.toMatchObject({
      code: 'RATE_LIMITED',
    })
    expect(await verifyOwnPassword(makeCtx(db, rowan, now + 15 * MINUTE_MS), PASSWORD)).toBe(true)
  })

  it('is never right for somebody without a password', async () => {
    const invited = makePerson(db, rowan.hospitalId)
    expect(await verifyOwnPassword(makeCtx(db, invited, Date.now()), '')).toBe(false)
  })
})
