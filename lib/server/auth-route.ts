import 'server-only'
import { APIError } from 'better-auth/api'
import { z } from 'zod'
import { findUserByEmail, deleteSession } from '@/db/queries/sessions'
import { AppError, invalidField } from '@/lib/shared/errors'
import { newId } from '@/lib/shared/ids'
import { MINUTE_MS } from '@/lib/shared/time'
import { clearAllowance, takeAllowance, tooManyTries, type AllowanceRule } from './allowance'
import { writeAudit } from './audit'
import { hashEmail, sharedAuth, signInKey, systemCtx } from './auth'
import { requestDatabase } from './database'
import { readEnv } from './env'
import { noStore, refuseForeignOrigin, toErrorResponse } from './http'
import { readJsonBody } from './read-body'
import { findStanding } from './session'

/** Ten failed sign-ins of one e-mail address in 15 min, from whatever place: then wait. */
const SIGN_IN_RULE: AllowanceRule = { max: 10, windowMs: 15 * MINUTE_MS }
/** Reset mails to one address in 15 min. */
const RESET_RULE: AllowanceRule = { max: 3, windowMs: 15 * MINUTE_MS }

const LONGEST_BODY_BYTES = 10_000
const credentialsSchema = z.object({ email: z.string().max(254), password: z.string().max(1000) })
const emailOnlySchema = z.object({ email: z.string().max(254) })
const resetSchema = z.object({ token: z.string().max(200), newPassword: z.string().max(1000) })

type Step = (request: Request) => Promise<Response>
const STEPS: Record<string, Step> = {
  '/api/auth/sign-in/email': signIn,
  '/api/auth/sign-out': signOut,
  '/api/auth/request-password-reset': requestReset,
  '/api/auth/reset-password': resetPassword,
}

/**
 * The four steps of signing in and out that are open to everybody, each POST from our own pages only. Anything else below
 * /api/auth is not found. Answers like every other route: ErrorDto on refusal, nothing about whether an account exists.
 */
export async function answerAuthRequest(request: Request): Promise<Response> {
  try {
    const step = request.method === 'POST' ? STEPS[new URL(request.url).pathname] : undefined
    if (!step) throw new AppError('NOT_FOUND', 'Not found.')
    refuseForeignOrigin(request)
    return noStore(await step(request))
  } catch (error) {
    return noStore(toErrorResponse(error, newId()))
  }
}

async function signIn(request: Request): Promise<Response> {
  const db = requestDatabase()
  const { secret } = readEnv()
  const given = await readJson(request, credentialsSchema)
  const email = given.email.trim().toLowerCase()
  const key = signInKey(email, secret)
  const waitMs = takeAllowance(db, key, SIGN_IN_RULE, Date.now())
  if (waitMs !== null) throw tooManyTries(waitMs)
  // A session of somebody else at the same workstation ends with this sign-in.
  const earlier = findStanding(db, request.headers.get('cookie'), Date.now())
  const answer = await callLibrary(request, '/sign-in/email', { email, password: given.password, rememberMe: false })
  if (answer.status === 200) {
    clearAllowance(db, key)
    if (earlier) endSession(earlier.actor.personId, earlier.actor.sessionId, 'replaced')
    return withCookiesOf(answer)
  }
  if (answer.status === 429) throw waitAsTold(answer)
  if (answer.status >= 500) throw new Error('The sign-in library failed.')
  const ctx = systemCtx(db)
  const personId = findUserByEmail(db, email)?.id
  const subject = personId ? { kind: 'person', id: personId } : { kind: 'email_hash', id: hashEmail(email, secret) }
  db.transaction((tx) => writeAudit(tx, ctx, { action: 'session.sign_in_failed', subject }), { behavior: 'immediate' })
  throw invalidField(
    'password',
    'E-mail address and password do not match an account here. Check both, or set a new password by mail.',
  )
}

async function signOut(request: Request): Promise<Response> {
  const standing = findStanding(requestDatabase(), request.headers.get('cookie'), Date.now())
  const answer = await callLibrary(request, '/sign-out', {})
  if (answer.status >= 400) throw new Error('The sign-in library failed.')
  if (standing) endSession(standing.actor.personId, standing.actor.sessionId, 'sign_out')
  return withCookiesOf(answer)
}

function endSession(personId: string, sessionId: string, reason: 'sign_out' | 'replaced'): void {
  const ctx = systemCtx(requestDatabase())
  ctx.db.transaction(
    (tx) => {
      deleteSession(tx, sessionId)
      writeAudit(tx, ctx, { action: 'session.sign_out', subject: { kind: 'person', id: personId }, after: { reason } })
    },
    { behavior: 'immediate' },
  )
}

async function requestReset(request: Request): Promise<Response> {
  const db = requestDatabase()
  const { secret } = readEnv()
  const email = (await readJson(request, emailOnlySchema)).email.trim().toLowerCase()
  if (!z.email().safeParse(email).success) throw invalidField('email', 'Write an e-mail address, such as rowan@hospital.example.')
  const waitMs = takeAllowance(db, `reset:${hashEmail(email, secret)}`, RESET_RULE, Date.now())
  if (waitMs !== null) throw tooManyTries(waitMs)
  const ctx = systemCtx(db)
  const subject = { kind: 'email_hash', id: hashEmail(email, secret) }
  db.transaction((tx) => writeAudit(tx, ctx, { action: 'password.reset_asked', subject }), { behavior: 'immediate' })
  const answer = await callLibrary(request, '/request-password-reset', { email })
  if (answer.status === 429) throw waitAsTold(answer)
  if (answer.status >= 400) throw new Error('The sign-in library failed.')
  return Response.json({ ok: true })
}

async function resetPassword(request: Request): Promise<Response> {
  const given = await readJson(request, resetSchema)
  if (given.newPassword.length < 12) throw invalidField('newPassword', 'Use at least 12 characters; a short sentence works well.')
  if (given.newPassword.length > 128) throw invalidField('newPassword', 'Use at most 128 characters.')
  const answer = await callLibrary(request, '/reset-password', given)
  if (answer.status === 429) throw waitAsTold(answer)
  if (answer.status >= 500) throw new Error('The sign-in library failed.')
  if (answer.status >= 400) throw new AppError('PRECONDITION', 'This link has run out or was already used. Ask for a new one.')
  return Response.json({ ok: true })
}

function waitAsTold(answer: Response): AppError {
  return tooManyTries(Number(answer.headers.get('x-retry-after') ?? 60) * 1000)
}

/** Hands a checked body to the library under the same headers, so that its own checks (address limit, origin) apply. */
async function callLibrary(request: Request, path: string, body: unknown): Promise<Response> {
  const headers = new Headers(request.headers)
  headers.delete('content-length')
  headers.set('content-type', 'application/json')
  const url = new URL(`/api/auth${path}`, readEnv().baseUrl)
  try {
    return await sharedAuth().handler(new Request(url, { method: 'POST', headers, body: JSON.stringify(body) }))
  } catch (error) {
    if (error instanceof APIError) return new Response(null, { status: error.statusCode })
    throw error
  }
}

/** The library's cookies without its body: the session token stays out of reach of scripts. */
function withCookiesOf(answer: Response): Response {
  const response = Response.json({ ok: true })
  for (const cookie of answer.headers.getSetCookie()) response.headers.append('set-cookie', cookie)
  return response
}

async function readJson<Schema extends z.ZodType>(request: Request, schema: Schema): Promise<z.output<Schema>> {
  const parsed = schema.safeParse(await readJsonBody(request, LONGEST_BODY_BYTES))
  if (!parsed.success) throw new AppError('INVALID', 'The request was not readable.')
  return parsed.data
}
