import 'server-only'
import { createHmac, timingSafeEqual } from 'node:crypto'
import { headers } from 'next/headers'
import { redirect } from 'next/navigation'
import { cache } from 'react'
import type { Db } from '@/db/client'
import { findSessionStanding, listMembershipsPrepared, updateSessionState } from '@/db/queries/sessions'
import { AppError } from '@/lib/shared/errors'
import { newId } from '@/lib/shared/ids'
import { HOUR_MS, MINUTE_MS } from '@/lib/shared/time'
import type { PersonActor, PersonCtx } from './ctx'
import { requestDatabase } from './database'
import { readEnv } from './env'
import { sessionCookieName } from './session-cookie'

/** A session ends this long after sign-in, whatever happens in it. */
export const SESSION_LENGTH_MS = 12 * HOUR_MS
/** The moment of last activity is written at most this often. */
const ACTIVITY_STEP_MS = 30_000

export type Standing = { actor: PersonActor; isLocked: boolean; lastActiveAt: number }

/**
 * Who a request's cookie stands for at a moment (UTC ms), and whether that screen is locked: by hand, or idle for longer than
 * the hospital allows. Null without a valid session, after sign-out, past its length, or for a deactivated person.
 */
export function findStanding(db: Db, cookieHeader: string | null, now: number): Standing | null {
  const token = readSignedToken(cookieHeader)
  const found = token === null ? undefined : findSessionStanding(db, token)
  if (!found || found.deactivatedAt !== null) return null
  if (found.expiresAt.getTime() <= now || found.createdAt.getTime() + SESSION_LENGTH_MS <= now) return null
  const actor: PersonActor = {
    kind: 'person',
    personId: found.personId,
    sessionId: found.sessionId,
    hospitalId: found.hospitalId,
    name: found.name,
    isAdministrator: found.isAdministrator,
    memberships: listMembershipsPrepared(db, found.personId),
  }
  const isIdle = now - found.lastActiveAt > found.idleLockMin * MINUTE_MS
  return { actor, isLocked: found.lockedAt !== null || isIdle, lastActiveAt: found.lastActiveAt }
}

/** The token in the session cookie if its signature holds: the sign-in library's format, token.base64(HMAC-SHA256), URI-encoded. */
function readSignedToken(cookieHeader: string | null): string | null {
  const { baseUrl, secret } = readEnv()
  const start = `${sessionCookieName(baseUrl)}=`
  const pair = cookieHeader
    ?.split(';')
    .map((part) => part.trim())
    .find((part) => part.startsWith(start))
  if (!pair) return null
  const value = decodeOrNull(pair.slice(start.length))
  const dot = value?.lastIndexOf('.') ?? -1
  if (value === null || dot < 1) return null
  const token = value.slice(0, dot)
  const given = Buffer.from(value.slice(dot + 1), 'base64')
  const right = createHmac('sha256', secret).update(token).digest()
  return given.length === right.length && timingSafeEqual(given, right) ? token : null
}

function decodeOrNull(text: string): string | null {
  try {
    return decodeURIComponent(text)
  } catch {
    return null
  }
}

/**
 * The person behind a request to the API. Throws UNAUTHENTICATED without a session and LOCKED when the screen is locked, except where
 * `evenLocked` lets a locked screen through (unlock, lock, me). A request that a person caused moves the moment of last activity.
 */
export async function requireActor(request: Request, options: { evenLocked?: boolean } = {}): Promise<PersonActor> {
  const db = requestDatabase()
  const now = Date.now()
  const standing = findStanding(db, request.headers.get('cookie'), now)
  if (!standing) throw new AppError('UNAUTHENTICATED', 'Please sign in. What you typed is still on this page.')
  if (standing.isLocked) {
    if (options.evenLocked) return standing.actor
    throw new AppError('LOCKED', 'This screen is locked. Unlock it with your password; what you typed is still here.')
  }
  const isActive = request.headers.get('x-daybreath-active') === '1'
  if (isActive && now - standing.lastActiveAt >= ACTIVITY_STEP_MS) {
    updateSessionState(db, standing.actor.sessionId, { lastActiveAt: now })
  }
  return standing.actor
}

/** Where a page is, for coming back to it after sign-in; set by the proxy. */
async function returnPath(): Promise<string> {
  const path = (await headers()).get('x-daybreath-path')
  return path && path !== '/' ? `?next=${encodeURIComponent(path)}` : ''
}

const pageStanding = cache(async (): Promise<Standing | null> => {
  return findStanding(requestDatabase(), (await headers()).get('cookie'), Date.now())
})

/** The person behind a page; looked up once for each request. Sends others to sign in, or to the unlock page. */
export const requirePageActor = cache(async (): Promise<PersonActor> => {
  const standing = await pageStanding()
  if (!standing) redirect(`/sign-in${await returnPath()}`)
  if (standing.isLocked) redirect(`/locked${await returnPath()}`)
  return standing.actor
})

/** Who sits at a locked screen; null when nobody is signed in. For the unlock page only. */
export async function findPageStanding(): Promise<Standing | null> {
  return pageStanding()
}

/** What a verb takes first, for reads made by a page. */
export const pageCtx = cache(async (): Promise<PersonCtx> => {
  const actor = await requirePageActor()
  return { actor, now: Date.now(), requestId: newId(), db: requestDatabase(), idempotencyKey: null }
})
