import { useSyncExternalStore } from 'react'

/** How long the server may be silent before a page says so, in milliseconds. */
export const SILENT_AFTER_MS = 15_000

/** When the server was last heard (this device's clock, ms), and whether that is too long ago to take the page for granted. */
export type Live = { heardAtMs: number; isSilent: boolean }

// One state for the whole page, so that its header and its notices never say different things.
let live: Live | null = null
let watchers = 0
let timer: ReturnType<typeof setInterval> | undefined
const listeners = new Set<() => void>()

function become(next: Live | null): void {
  live = next
  for (const listener of listeners) listener()
}

/** Notes that the server has just answered, by the clock of this device. */
export function noteHeard(nowMs: number): void {
  if (watchers > 0) become({ heardAtMs: nowMs, isSilent: false })
}

/** Tells the frame that this page keeps itself up to date. Returns the way to end it. */
export function startWatching(nowMs: number): () => void {
  watchers += 1
  noteHeard(nowMs)
  timer ??= setInterval(noticeSilence, 1_000)
  return () => {
    watchers -= 1
    if (watchers > 0) return
    clearInterval(timer)
    timer = undefined
    become(null)
  }
}

function noticeSilence(): void {
  if (live && !live.isSilent && Date.now() - live.heardAtMs > SILENT_AFTER_MS) become({ ...live, isSilent: true })
}

function subscribe(listener: () => void): () => void {
  listeners.add(listener)
  return () => listeners.delete(listener)
}

/** Whether this page is live; null on a page that does not keep itself up to date. */
export function useLive(): Live | null {
  return useSyncExternalStore(
    subscribe,
    () => live,
    () => null,
  )
}
