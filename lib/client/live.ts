import { useSyncExternalStore } from 'react'

/** How long the server may be silent before a page says so, in milliseconds. */
export const SILENT_AFTER_MS = 15_000

let heardAtMs: number | null = null
let watchers = 0
const listeners = new Set<() => void>()

function tellAll(): void {
  for (const listener of listeners) listener()
}

/** Notes that the server has just answered, by the clock of this device. */
export function noteHeard(nowMs: number): void {
  heardAtMs = nowMs
  tellAll()
}

/** Tells the header that this page keeps itself up to date. Returns the way to end it. */
export function startWatching(nowMs: number): () => void {
  watchers += 1
  noteHeard(nowMs)
  return () => {
    watchers -= 1
    tellAll()
  }
}

function subscribe(listener: () => void): () => void {
  listeners.add(listener)
  return () => listeners.delete(listener)
}

/** When this page last heard the server (device clock, ms); null on a page that does not keep itself up to date. */
export function useHeardAt(): number | null {
  return useSyncExternalStore(
    subscribe,
    () => (watchers > 0 ? heardAtMs : null),
    () => null,
  )
}
