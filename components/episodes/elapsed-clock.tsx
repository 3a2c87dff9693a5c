import type { ReactNode } from 'react'

/** "34:12", "1:04:12": hours, minutes and seconds gone by. Never below zero. */
export function elapsedText(ms: number): string {
  const seconds = Math.max(0, Math.floor(ms / 1000))
  const parts = [Math.floor((seconds % 3600) / 60), seconds % 60].map((part) => String(part).padStart(2, '0'))
  const hours = Math.floor(seconds / 3600)
  return hours > 0 ? `${hours}:${parts.join(':')}` : parts.join(':')
}

/** The large clock of a running hold or trial, counted by the server's time. */
export function ElapsedClock({ sinceMs, nowMs, children }: { sinceMs: number; nowMs: number; children?: ReactNode }) {
  return (
    <div className="desk:text-right">
      <p role="timer" aria-label="Time since the start" className="figure text-5xl leading-none font-semibold tablet:text-6xl">
        {elapsedText(nowMs - sinceMs)}
      </p>
      {children}
    </div>
  )
}
