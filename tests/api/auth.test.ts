import { eq, like } from 'drizzle-orm'
import { beforeEach, describe, expect, it, vi } from 'vitest'
import type { Db } from '@/db/client'
import { savePasswordHash } from '@/db/queries/sessions'
import { auditLog, mailLedger, people, rateLimit, session, sessionStates, verification } from '@/db/schema'
import { takeAllowance } from '@/lib/server/allowance'
import { hashNewPassword, signInKey } from '@/lib/server/auth'
import { answerAuthRequest } from '@/lib/server/auth-route'
import { findStanding } from '@/lib/server/session'
import { newId } from '@/lib/shared/ids'
import { HOUR_MS } from '@/lib/shared/time'
import { makeHospital, makePerson, type TestPerson } from '../helpers/factories'
import { openTestDatabase } from '../helpers/database'
import { cookieOf, makeRequest, makeSession, serveDatabase, TEST_SECRET } from '../helpers/test-server'

const PASSWORD = 'a long enough sentence'

// Each real password check costs 0.2 s, more on a busy machine.
vi.setConfig({ testTimeout: 60_000 })
const EMAIL = 'rowan@example.invalid'

let db: Db
let rowan: TestPerson
let hash: string | undefined

beforeEach(async () => {
  db = openTestDatabase()
  serveDatabase(db)
  hash ??= await hashNewPassword(PASSWORD)
  rowan = makePerson(db, makeHospital(db).id, [], { email: EMAIL, isAdministrator: true })
  savePasswordHash(db, { id: newId(), personId: rowan.id, hash, now: Date.now() })
})

const signIn = (email: string, password: string, options: { cookie?: string; headers?: Record<string, string> } = {}) =>
  answerAuthRequest(makeRequest('/api/auth/sign-in/email', { body: { email, password }, ...options }))
/** Failed sign-ins as the sign-in counts them, without the 0.2 s that each real one costs. */
const failTimes = (email: string, times: number) => {
  for (let tries = 0; tries < times; tries += 1)
    takeAllowance(db, signInKey(email, TEST_SECRET), { max: 10, windowMs: 15 * 60_000 }, Date.now())
}
const audited = (action: string) => db.select().from(auditLog).where(eq(auditLog.action, action)).all()

describe('signing in', () => {
  it('begins a session with its state and audit row, and the cookie opens it', async () => {
    const response = await signIn(EMAIL, PASSWORD)
    expect(response.status).toBe(200)
    expect(findStanding(db, cookieOf(response), Date.now())).toMatchObject({ isLocked: false, actor: { personId: rowan.id } })
    expect(audited('session.sign_in').map((row) => row.subjectId)).toEqual([rowan.id])
    expect(db.select().from(sessionStates).all()).toHaveLength(1)
  })

  it('keeps the session token away from scripts: only in an HttpOnly cookie that ends with the browser', async () => {
    const response = await signIn(EMAIL, PASSWORD)
    expect(await response.json()).toEqual({ ok: true })
    const cookie = response.headers.getSetCookie().find((line) => line.includes('session_token')) ?? ''
    expect(cookie).toMatch(/HttpOnly/i)
    expect(cookie).toMatch(/SameSite=Lax/i)
    expect(cookie).not.toMatch(/Max-Age|Expires/i)
    expect(response.headers.get('cache-control')).toBe('no-store')
  })

  it('takes the e-mail address in any case and with blanks around it', async () => {
    expect((await signIn('  Rowan@Example.INVALID ', PASSWORD)).status).toBe(200)
  })

  it('ends after 12 hours, even if the browser keeps the cookie', async () => {
    const cookie = cookieOf(await signIn(EMAIL, PASSWORD))
    const [row] = db.select().from(session).all()
    expect((row?.expiresAt.getTime() ?? 0) - Date.now()).toBeLessThanOrEqual(12 * HOUR_MS)
    expect(findStanding(db, cookie, Date.now() + 12 * HOUR_MS + 1)).toBeNull()
  })

  it('gives the same answer for a wrong password and for an unknown address, and audits both', async () => {
    const wrong = await signIn(EMAIL, 'not the password')
    const unknown = await signIn('nobody@example.invalid', 'not the password')
    const strip = async (response: Response) => {
      const { requestId: _requestId, ...rest } = (await response.json()) as Record<string, unknown>
      return { status: response.status, ...rest }
    }
    expect(await strip(wrong)).toEqual(await strip(unknown))
    const rows = audited('session.sign_in_failed')
    expect(rows.map((row) => row.subjectKind)).toEqual(['person', 'email_hash'])
    expect(JSON.stringify(rows)).not.toContain('nobody@')
    expect(JSON.stringify(db.select().from(rateLimit).all())).not.toContain('@')
  })

  it('answers a deactivated person like a wrong password, and leaves no session', async () => {
    const wrong = (await (await signIn(EMAIL, 'not the password')).json()) as { message: string; fields: unknown }
    db.update(people).set({ deactivatedAt: Date.now() }).where(eq(people.id, rowan.id)).run()
    const response = await signIn(EMAIL, PASSWORD)
    expect(response.status).toBe(422)
    expect(await response.json()).toMatchObject({ message: wrong.message, fields: wrong.fields })
    expect(db.select().from(session).all()).toEqual([])
  })

  it('lets nobody in on an address without a password', async () => {
    makePerson(db, rowan.hospitalId, [], { email: 'invited@example.invalid' })
    expect((await signIn('invited@example.invalid', '')).status).toBe(422)
    expect(db.select().from(session).all()).toEqual([])
  })

  it('ends the session of whoever was signed in at this workstation', async () => {
    const other = makePerson(db, rowan.hospitalId)
    const { sessionId, cookie } = makeSession(db, other.id)
    expect((await signIn(EMAIL, PASSWORD, { cookie })).status).toBe(200)
    expect(db.select().from(session).where(eq(session.id, sessionId)).all()).toEqual([])
    expect(audited('session.sign_out').map((row) => [row.subjectId, row.after])).toEqual([[other.id, { reason: 'replaced' }]])
  })
})

describe('the lock-out of an account', () => {
  it('makes the eleventh try within 15 min wait, also with the right password and from another address', async () => {
    for (let tries = 0; tries < 10; tries += 1) expect((await signIn(EMAIL, `wrong ${tries}`)).status).toBe(422)
    const refused = await signIn(EMAIL, PASSWORD, { headers: { 'x-forwarded-for': '203.0.113.9' } })
    expect(refused.status).toBe(429)
    expect(await refused.json()).toMatchObject({ code: 'RATE_LIMITED', message: expect.stringContaining('15 minutes') })
    expect(db.select().from(session).all()).toEqual([])
  })

  it('works alike for an address that has no account', async () => {
    failTimes('nobody@example.invalid', 9)
    expect((await signIn('nobody@example.invalid', 'wrong')).status).toBe(422)
    expect((await signIn('nobody@example.invalid', 'wrong')).status).toBe(429)
    expect((await signIn(EMAIL, PASSWORD)).status).toBe(200)
  })

  it('lets tries at the same moment through no more than ten times', async () => {
    const answers = await Promise.all(Array.from({ length: 14 }, (_, at) => signIn(EMAIL, `wrong ${at}`)))
    expect(answers.filter((answer) => answer.status === 422)).toHaveLength(10)
    expect(answers.filter((answer) => answer.status === 429)).toHaveLength(4)
  })

  it('ends after 15 min', async () => {
    failTimes(EMAIL, 10)
    expect((await signIn(EMAIL, PASSWORD)).status).toBe(429)
    db.update(rateLimit)
      .set({ lastRequest: Date.now() - 15 * 60_000 - 1 })
      .run()
    expect((await signIn(EMAIL, PASSWORD)).status).toBe(200)
  })

  it('starts anew after a right password', async () => {
    failTimes(EMAIL, 9)
    expect((await signIn(EMAIL, PASSWORD)).status).toBe(200)
    failTimes(EMAIL, 9)
    expect((await signIn(EMAIL, PASSWORD)).status).toBe(200)
  })
})

describe('the limit by address', () => {
  it('stops a flood over many accounts, and a header that the client makes up buys nothing', async () => {
    const from = (address: string) => ({ headers: { 'x-forwarded-for': address, 'x-real-ip': address } })
    expect((await signIn('nobody1@example.invalid', 'wrong', from('203.0.113.1'))).status).toBe(422)
    const counted = db.update(rateLimit).set({ count: 29 }).where(like(rateLimit.key, 'address:%')).run()
    expect(counted.changes).toBe(1)
    expect((await signIn('nobody2@example.invalid', 'wrong', from('203.0.113.2'))).status).toBe(422)
    expect((await signIn('nobody3@example.invalid', 'wrong', from('203.0.113.3'))).status).toBe(429)
    expect(audited('session.sign_in_failed')).toHaveLength(2)
  })
})

describe('what is open', () => {
  const closed = [
    'sign-up/email',
    'get-session',
    'update-user',
    'change-password',
    'change-email',
    'delete-user',
    'list-sessions',
    'sign-in/social',
    'set-password',
    'verify-email',
    'reset-password/abc',
    'ok',
    'error',
    'sign-in',
    'list-accounts',
    'revoke-sessions',
    '',
  ]
  it.each(closed)('answers not found for /api/auth/%s, POST and GET', async (path) => {
    const { cookie } = makeSession(db, rowan.id)
    expect((await answerAuthRequest(makeRequest(`/api/auth/${path}`, { cookie }))).status).toBe(404)
    expect((await answerAuthRequest(makeRequest(`/api/auth/${path}`, { method: 'GET', cookie }))).status).toBe(404)
  })

  it('answers not found for a GET of an open step', async () => {
    expect((await answerAuthRequest(makeRequest('/api/auth/sign-in/email', { method: 'GET' }))).status).toBe(404)
  })

  it.each(['https://elsewhere.invalid', 'null', ''])('refuses a sign-in from origin "%s"', async (origin) => {
    expect((await signIn(EMAIL, PASSWORD, { headers: { origin } })).status).toBe(403)
    expect(db.select().from(session).all()).toEqual([])
  })

  it('refuses what is not readable without counting it', async () => {
    const answers = await Promise.all([
      answerAuthRequest(makeRequest('/api/auth/sign-in/email', { body: { email: 5 } })),
      answerAuthRequest(makeRequest('/api/auth/sign-in/email', { body: 'x'.repeat(20_000) })),
      answerAuthRequest(makeRequest('/api/auth/sign-in/email', { body: [] })),
    ])
    expect(answers.map((answer) => answer.status)).toEqual([422, 422, 422])
    expect(db.select().from(rateLimit).all()).toEqual([])
  })
})

describe('signing out', () => {
  it('deletes the session, clears the cookie and writes the audit row', async () => {
    const { cookie } = makeSession(db, rowan.id)
    const response = await answerAuthRequest(makeRequest('/api/auth/sign-out', { cookie }))
    expect(response.status).toBe(200)
    expect(
      response.headers.getSetCookie().some((line) => line.startsWith('daybreath.session_token=;') && line.includes('Max-Age=0')),
    ).toBe(true)
    expect(db.select().from(session).all()).toEqual([])
    expect(db.select().from(sessionStates).all()).toEqual([])
    expect(audited('session.sign_out').map((row) => row.subjectId)).toEqual([rowan.id])
    expect(findStanding(db, cookie, Date.now())).toBeNull()
  })

  it('works at a locked screen', async () => {
    const { cookie } = makeSession(db, rowan.id, { lockedAt: Date.now() })
    expect((await answerAuthRequest(makeRequest('/api/auth/sign-out', { cookie }))).status).toBe(200)
    expect(db.select().from(session).all()).toEqual([])
  })
})

describe('a new password by mail', () => {
  const ask = (email: string) => answerAuthRequest(makeRequest('/api/auth/request-password-reset', { body: { email } }))
  const reset = (token: string, newPassword: string) =>
    answerAuthRequest(makeRequest('/api/auth/reset-password', { body: { token, newPassword } }))
  const mailedToken = () => {
    const [mail] = db.select().from(mailLedger).all()
    return new URL(/https?:\/\/\S+/.exec(mail?.bodyText ?? '')?.[0] ?? 'http://none').searchParams.get('token') ?? ''
  }

  it('queues one mail with a link, answers the same for an unknown address, and says nothing of the person in it', async () => {
    const known = await ask('ROWAN@example.invalid')
    const unknown = await ask('nobody@example.invalid')
    expect([known.status, unknown.status]).toEqual([200, 200])
    expect(await known.json()).toEqual(await unknown.json())
    const mails = db.select().from(mailLedger).all()
    expect(mails.map((mail) => [mail.kind, mail.recipient, mail.personId])).toEqual([['password_reset', EMAIL, rowan.id]])
    expect(mails[0]?.bodyText).toContain('http://daybreath.test/reset-password?token=')
    expect(mails[0]?.bodyText).not.toContain(rowan.name)
    expect(audited('password.reset_asked')).toHaveLength(2)
    expect(audited('password.reset_mailed').map((row) => row.subjectId)).toEqual([rowan.id])
  })

  it('sets the new password once, ends every session, and opens the account again after a lock-out', async () => {
    failTimes(EMAIL, 10)
    makeSession(db, rowan.id)
    await ask(EMAIL)
    const token = mailedToken()
    expect((await reset(token, 'another long sentence')).status).toBe(200)
    expect(db.select().from(session).all()).toEqual([])
    expect(audited('password.reset').map((row) => row.subjectId)).toEqual([rowan.id])
    expect((await signIn(EMAIL, PASSWORD)).status).toBe(422)
    expect((await signIn(EMAIL, 'another long sentence')).status).toBe(200)
    expect((await reset(token, 'a third long sentence')).status).toBe(409)
  })

  it('keeps no token that could be read out of the database', async () => {
    await ask(EMAIL)
    expect(JSON.stringify(db.select().from(verification).all())).not.toContain(mailedToken())
  })

  it('refuses a short password, an unknown link and one that has run out', async () => {
    await ask(EMAIL)
    const token = mailedToken()
    expect(await (await reset(token, 'too short')).json()).toMatchObject({
      fields: { newPassword: expect.stringContaining('12') },
    })
    expect((await reset('x'.repeat(24), 'another long sentence')).status).toBe(409)
    db.update(verification)
      .set({ expiresAt: new Date(Date.now() - 1000) })
      .run()
    expect((await reset(token, 'another long sentence')).status).toBe(409)
    expect((await signIn(EMAIL, PASSWORD)).status).toBe(200)
  })

  it('mails nobody who is deactivated or never set a password', async () => {
    makePerson(db, rowan.hospitalId, [], { email: 'invited@example.invalid' })
    db.update(people).set({ deactivatedAt: Date.now() }).where(eq(people.id, rowan.id)).run()
    await ask(EMAIL)
    await ask('invited@example.invalid')
    expect(db.select().from(mailLedger).all()).toEqual([])
  })

  it('sends at most three to one address in 15 min', async () => {
    const statuses = []
    for (let asked = 0; asked < 4; asked += 1) statuses.push((await ask(EMAIL)).status)
    expect(statuses).toEqual([200, 200, 200, 429])
    expect(db.select().from(mailLedger).all()).toHaveLength(3)
  })
})
