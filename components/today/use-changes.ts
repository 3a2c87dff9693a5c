'use client'

import { useEffect, useRef, useState } from 'react'
import type { TodayDto, TodayRowDto } from '@/lib/schemas/today'

export type Changes = {
  /** How often each patient's row has changed since the page was opened. */
  counts: Readonly<Record<string, number>>
  /** For the polite live region: the moves that changed last, in words. */
  announcement: string
}

/** More than this many at once are counted rather than read out one by one. */
const MOST_READ_OUT = 3

/** Watches the rows from one answer to the next: which changed, and which moves are new. */
export function useChanges(today: TodayDto, titleOf: (row: TodayRowDto) => string): Changes {
  const earlier = useRef<Map<string, { row: string; title: string }> | null>(null)
  const [changes, setChanges] = useState<Changes>({ counts: {}, announcement: '' })

  useEffect(() => {
    const present = new Map(today.rows.map((row) => [row.patientId, { row: fingerprint(row), title: titleOf(row) }]))
    const before = earlier.current
    earlier.current = present
    if (before === null) return
    const changed = today.rows.filter((row) => before.get(row.patientId)?.row !== present.get(row.patientId)?.row)
    if (changed.length === 0) return
    const moved = changed.filter((row) => before.get(row.patientId)?.title !== present.get(row.patientId)?.title)
    setChanges(({ counts, announcement }) => ({
      counts: { ...counts, ...Object.fromEntries(changed.map((row) => [row.patientId, (counts[row.patientId] ?? 0) + 1])) },
      announcement: moved.length > 0 ? announce(moved, titleOf) : announcement,
    }))
  }, [today, titleOf])

  return changes
}

// By bed only: the announcement is also heard on a screen that hides names.
function announce(rows: readonly TodayRowDto[], titleOf: (row: TodayRowDto) => string): string {
  if (rows.length > MOST_READ_OUT) return `${rows.length} moves have changed.`
  return rows.map((row) => `Bed ${row.bedLabel}: ${titleOf(row)}.`).join(' ')
}

function fingerprint(row: TodayRowDto): string {
  return JSON.stringify([row.bedLabel, row.familyName, row.givenName, row.settings, row.track, row.move, row.endedAtMs])
}
