import 'server-only'
import { betterAuth } from 'better-auth'
import { drizzleAdapter } from 'better-auth/adapters/drizzle'
import { APIError } from 'better-auth/api'
import { hashPassword, verifyPassword } from 'better-auth/crypto'
import { createHmac } from 'node:crypto'
import type { Db } from '@/db/client'
import { findPerson } from '@/db/queries/access'
import { deleteExpiredSessions, findPasswordHash, insertSessionState } from '@/db/queries/sessions'
import * as tables from '@/db/schema/auth'
import { queueAccountMail } from '@/lib/services/mail/queue-account-mail'
import { newId } from '@/lib/shared/ids'
import { MINUTE_MS } from '@/lib/shared/time'
import { clearAllowance, takeAllowance, tooManyTries, type AllowanceRule } from './allowance'
import { writeAudit } from './audit'
import type { Ctx, PersonCtx } from './ctx'
import { requestDatabase } from './database'
import { readEnv, type Env } from './env'
import { log } from './log'
import { SESSION_LENGTH_MS } from './session'
import { COOKIE_PREFIX } from './session-cookie'

const RESET_LINK_SECONDS = 3600
/** Wrong passwords while signed in: for signing a decision and for changing the password. */
const OWN_PASSWORD_RULE: AllowanceRule = { max: 5, windowMs: 15 * MINUTE_MS }
/** Sign-in and reset requests in one minute from one address; all together when no trusted proxy tells addresses apart. */
const PER_ADDRESS = { window: 60, max: 30 }
const ALL_TOGETHER = { window: 60, max: 240 }

// Everything that the library offers beyond the four paths that auth-route.ts lets through.
const DISABLED_PATHS = [
  '/sign-up/email',
  '/sign-in/social',
  '/get-session',
  '/list-sessions',
  '/revoke-session',
  '/revoke-sessions',
  '/revoke-other-sessions',
  '/update-user',
  '/update-session',
  '/change-email',
  '/change-password',
  '/set-password',
  '/verify-password',
  '/delete-user',
  '/delete-user/callback',
  '/verify-email',
  '/send-verification-email',
  '/link-social',
  '/unlink-account',
  '/list-accounts',
  '/refresh-token',
  '/get-access-token',
  '/account-info',
  '/ok',
  '/error',
]

/** A context for what the sign-in itself writes. */
export function systemCtx(db: Db, now = Date.now()): Ctx {
  return { actor: { kind: 'system' }, now, requestId: newId(), db, idempotencyKey: null }
}

/** Stands for an e-mail address in audit rows and counters, so that none holds the address of somebody without an account. */
export function hashEmail(email: string, secret: string): string {
  return createHmac('sha256', secret).update(`email:${email}`).digest('hex').slice(0, 32)
}

/** The sign-in on this database. Create it on first use only, never while building. */
export function createAuth(db: Db, env: Pick<Env, 'baseUrl' | 'secret' | 'trustedProxyHeader'>) {
  return betterAuth({
    appName: 'Daybreath',
    baseURL: env.baseUrl,
    basePath: '/api/auth',
    secret: env.secret,
    telemetry: { enabled: false },
    disabledPaths: DISABLED_PATHS,
    database: drizzleAdapter(db, { provider: 'sqlite', schema: tables, transaction: false }),
    emailAndPassword: {
      enabled: true,
      disableSignUp: true,
      minPasswordLength: 12,
      maxPasswordLength: 128,
      revokeSessionsOnPasswordReset: true,
      resetPasswordTokenExpiresIn: RESET_LINK_SECONDS,
      sendResetPassword: async ({ user, token }) => queueResetMail(db, env.baseUrl, user, token),
      onPasswordReset: async ({ user }) => recordReset(db, env.secret, user),
    },
    verification: { storeIdentifier: 'hashed' },
    session: { expiresIn: SESSION_LENGTH_MS / 1000, disableSessionRefresh: true, cookieCache: { enabled: false } },
    databaseHooks: {
      session: {
        create: {
          before: async (row) => refuseDeactivated(db, row.userId),
          after: async (row) => beginSession(db, row),
        },
      },
    },
    rateLimit: {
      enabled: true,
      ...PER_ADDRESS,
      customRules: { '/**': PER_ADDRESS },
      customStorage: { consume: async (key) => limitAddress(db, key) },
    },
    advanced: {
      cookiePrefix: COOKIE_PREFIX,
      useSecureCookies: env.baseUrl.startsWith('https://'),
      disableCSRFCheck: false,
      disableOriginCheck: false,
      // Without a proxy of our own any address header is the client's invention, so none is believed.
      ipAddress: { ipAddressHeaders: env.trustedProxyHeader ? [env.trustedProxyHeader] : [] },
    },
    // Faults come out as they are, so that our own log takes them; the library would print them as a whole.
    onAPIError: { throw: true },
    logger: { level: 'error', log: (level, message) => log.error({ source: 'sign-in', level }, message) },
  })
}

export type Auth = ReturnType<typeof createAuth>

function limitAddress(db: Db, key: string): { allowed: boolean; retryAfter: number | null } {
  const rule = key.startsWith('no-trusted-ip') ? ALL_TOGETHER : PER_ADDRESS
  const waitMs = takeAllowance(db, `address:${key}`, { max: rule.max, windowMs: rule.window * 1000 }, Date.now())
  return waitMs === null ? { allowed: true, retryAfter: null } : { allowed: false, retryAfter: Math.ceil(waitMs / 1000) }
}

/** A deactivated person gets the same answer as a wrong password. The session's length is fixed here, whatever the client asked for. */
function refuseDeactivated(db: Db, personId: string): { data: { expiresAt: Date } } {
  const person = findPerson(db, personId)
  if (!person || person.deactivatedAt !== null) throw new APIError('UNAUTHORIZED', { message: 'Invalid email or password' })
  return { data: { expiresAt: new Date(Date.now() + SESSION_LENGTH_MS) } }
}

/** Without its state row a session opens nothing, so a failure here leaves nobody signed in without an audit row. */
function beginSession(db: Db, row: { id: string; userId: string }): void {
  const ctx = systemCtx(db)
  db.transaction(
    (tx) => {
      deleteExpiredSessions(tx, ctx.now)
      insertSessionState(tx, { sessionId: row.id, personId: row.userId, lastActiveAt: ctx.now })
      writeAudit(tx, ctx, { action: 'session.sign_in', subject: { kind: 'person', id: row.userId } })
    },
    { behavior: 'immediate' },
  )
}

function queueResetMail(db: Db, baseUrl: string, user: { id: string; email: string }, token: string): void {
  const ctx = systemCtx(db)
  const person = findPerson(db, user.id)
  // Someone who never accepted an invitation has no password to reset; the administrator sends a new invitation.
  if (!person || person.deactivatedAt !== null || findPasswordHash(db, user.id) === null) return
  const link = new URL(`/reset-password?token=${encodeURIComponent(token)}`, baseUrl).href
  db.transaction(
    (tx) => {
      queueAccountMail(tx, { kind: 'password_reset', personId: user.id, recipient: user.email, link, now: ctx.now })
      writeAudit(tx, ctx, { action: 'password.reset_mailed', subject: { kind: 'person', id: user.id } })
    },
    { behavior: 'immediate' },
  )
}

function recordReset(db: Db, secret: string, user: { id: string; email: string }): void {
  const ctx = systemCtx(db)
  db.transaction((tx) => writeAudit(tx, ctx, { action: 'password.reset', subject: { kind: 'person', id: user.id } }), {
    behavior: 'immediate',
  })
  clearAllowance(db, signInKey(user.email, secret))
  clearAllowance(db, ownPasswordKey(user.id))
}

/** Counter of failed sign-ins of an e-mail address, whether it has an account or not. */
export function signInKey(email: string, secret: string): string {
  return `sign-in:${hashEmail(email.toLowerCase(), secret)}`
}

const ownPasswordKey = (personId: string) => `own-password:${personId}`

const shared = globalThis as typeof globalThis & { daybreathAuth?: Auth }

/** The program's one sign-in, kept across reloads and shared by all copies of this module. */
export function sharedAuth(): Auth {
  shared.daybreathAuth ??= createAuth(requestDatabase(), readEnv())
  return shared.daybreathAuth
}

/** The hash under which a new password is kept (scrypt, about 0.2 s). Never pass a password into `once`, which keeps a hash of its input. */
export async function hashNewPassword(password: string): Promise<string> {
  return hashPassword(password)
}

/** Whether this is the password of a person. No counting: for callers that count by themselves. */
export async function isPasswordOf(db: Db, personId: string, password: string): Promise<boolean> {
  const hash = findPasswordHash(db, personId)
  return hash !== null && password.length <= 128 && (await verifyPassword({ hash, password }))
}

/**
 * Whether this is the signed-in person's own password, asked for again before signing. After 5 wrong tries within 15 min it throws
 * RATE_LIMITED until the 15 min are over; every wrong try stands in the audit log.
 */
export async function verifyOwnPassword(ctx: PersonCtx, password: string): Promise<boolean> {
  const { personId } = ctx.actor
  const waitMs = takeAllowance(ctx.db, ownPasswordKey(personId), OWN_PASSWORD_RULE, ctx.now)
  if (waitMs !== null) throw tooManyTries(waitMs)
  if (await isPasswordOf(ctx.db, personId, password)) {
    clearAllowance(ctx.db, ownPasswordKey(personId))
    return true
  }
  ctx.db.transaction((tx) => writeAudit(tx, ctx, { action: 'password.wrong', subject: { kind: 'person', id: personId } }), {
    behavior: 'immediate',
  })
  return false
}
