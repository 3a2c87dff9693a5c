import { createHmac } from 'node:crypto'
import type { Db } from '@/db/client'
import { session, sessionStates } from '@/db/schema'
import { newId } from '@/lib/shared/ids'
import { HOUR_MS } from '@/lib/shared/time'

export const TEST_BASE_URL = 'http://daybreath.test'
export const TEST_SECRET = 'a-secret-for-tests-only-0123456789abcdef'

/** Makes the route handlers of this test file use the given database, under the address and secret above. Call before the first request. */
export function serveDatabase(db: Db): void {
  Object.assign(process.env, { DAYBREATH_DATABASE: ':memory:', DAYBREATH_BASE_URL: TEST_BASE_URL, DAYBREATH_SECRET: TEST_SECRET })
  const shared = globalThis as typeof globalThis & { daybreathDb?: Db; daybreathAuth?: unknown }
  shared.daybreathDb = db
  delete shared.daybreathAuth
}

/** A signed-in session of a person, as its cookie header. By the real clock, since routes use it. */
export function makeSession(
  db: Db,
  personId: string,
  over: { createdAt?: number; lastActiveAt?: number; lockedAt?: number | null } = {},
): { sessionId: string; cookie: string } {
  const createdAt = over.createdAt ?? Date.now()
  const sessionId = newId()
  const token = newId()
  db.insert(session)
    .values({
      id: sessionId,
      token,
      userId: personId,
      createdAt: new Date(createdAt),
      updatedAt: new Date(createdAt),
      expiresAt: new Date(createdAt + 12 * HOUR_MS),
    })
    .run()
  db.insert(sessionStates)
    .values({ sessionId, personId, lastActiveAt: over.lastActiveAt ?? createdAt, lockedAt: over.lockedAt ?? null })
    .run()
  const signature = createHmac('sha256', TEST_SECRET).update(token).digest('base64')
  return { sessionId, cookie: `daybreath.session_token=${encodeURIComponent(`${token}.${signature}`)}` }
}

type RequestOptions = { method?: 'GET' | 'POST'; body?: unknown; cookie?: string; headers?: Record<string, string> }

/** A request as a browser on our own pages sends it: POST with its origin, unless a header says otherwise. */
export function makeRequest(path: string, options: RequestOptions = {}): Request {
  const { method = 'POST', body, cookie, headers = {} } = options
  return new Request(new URL(path, TEST_BASE_URL), {
    method,
    headers: {
      ...(method === 'POST' ? { origin: TEST_BASE_URL, 'content-type': 'application/json' } : {}),
      ...(cookie ? { cookie } : {}),
      ...headers,
    },
    ...(method === 'POST' ? { body: JSON.stringify(body ?? {}) } : {}),
  })
}

/** What Next hands to a route beside the request. */
export function routeParams(params: Record<string, string> = {}) {
  return { params: Promise.resolve(params) }
}

/** The session cookie that a response sets, ready to be sent back; null when it sets none or clears it. */
export function cookieOf(response: Response): string | null {
  const set = response.headers.getSetCookie().find((line) => line.includes('session_token='))
  const pair = set?.split(';')[0] ?? ''
  return pair === '' || pair.endsWith('=') ? null : pair
}
