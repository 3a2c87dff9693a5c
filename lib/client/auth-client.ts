import type { MeDto } from '@/lib/schemas/session'
import { apiPost, LOCKED_EVENT } from './api'
import { leaveFor } from './leave-for'

const CHANNEL = 'daybreath-session'

/** What open tabs of one browser tell each other about the session they share. Never anything about a person. */
export type SessionNews = { kind: 'active' | 'locked' | 'unlocked' | 'signed_out' }

/** Listens to the other tabs of this browser. Answers how to tell them, and how to stop. */
export function joinTabs(hear: (news: SessionNews) => void): { tell: (news: SessionNews) => void; leave: () => void } {
  if (typeof BroadcastChannel === 'undefined') return { tell: () => {}, leave: () => {} }
  const channel = new BroadcastChannel(CHANNEL)
  channel.onmessage = (event: MessageEvent<SessionNews>) => hear(event.data)
  return { tell: (news) => channel.postMessage(news), leave: () => channel.close() }
}

/** Tells the other tabs once, from a page that does not listen to them. */
export function tellTabs(news: SessionNews): void {
  const tabs = joinTabs(() => {})
  tabs.tell(news)
  tabs.leave()
}

/** Covers this page at once and locks the session; for the "lock now" entry of a menu. */
export function lockScreen(): void {
  window.dispatchEvent(new Event(LOCKED_EVENT))
}

/** Tells the server that the screen is locked. A failure is harmless: the server locks by itself once the time is over. */
export async function sendLock(): Promise<void> {
  await fetch('/api/session/lock', { method: 'POST', headers: { 'content-type': 'application/json' }, body: '{}' }).catch(
    () => undefined,
  )
}

/** Who is signed in, also at a locked screen; null when nobody is, undefined when the server gives no answer. */
export async function fetchMe(isActive: boolean): Promise<MeDto | null | undefined> {
  try {
    const response = await fetch('/api/me', { cache: 'no-store', headers: isActive ? { 'x-daybreath-active': '1' } : {} })
    if (response.status === 401) return null
    return response.ok ? ((await response.json()) as MeDto) : undefined
  } catch {
    return undefined
  }
}

/** Ends this session, here and in the other tabs, and goes to the sign-in page. Throws ApiError when the server gives no answer. */
export async function signOut(): Promise<void> {
  await apiPost('/api/auth/sign-out', {})
  tellTabs({ kind: 'signed_out' })
  leaveFor('/sign-in')
}
