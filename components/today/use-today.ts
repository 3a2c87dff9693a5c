'use client'

import { useQuery } from '@tanstack/react-query'
import { useEffect, useState } from 'react'
import { apiGet } from '@/lib/client/api'
import { todayKeys } from '@/lib/client/keys/today'
import { startWatching, useLive } from '@/lib/client/live'
import type { TodayDto } from '@/lib/schemas/today'

/** A colleague's entry is to be seen within 5 s; the rest of the time is for the answer and the drawing. */
const POLL_MS = 3_000

/** The unit's day, first from the page and then read again every few seconds while the page can be seen. */
export function useToday(first: TodayDto): { today: TodayDto; isSilent: boolean } {
  const unitId = first.unit.id
  const [startedAtMs] = useState(() => Date.now())
  const { data } = useQuery({
    queryKey: todayKeys.unit(unitId),
    queryFn: ({ signal }) => apiGet<TodayDto>(`/api/units/${unitId}/today`, { signal }),
    initialData: first,
    initialDataUpdatedAt: startedAtMs,
    refetchInterval: POLL_MS,
  })
  useEffect(() => startWatching(Date.now()), [])
  return { today: data.nowMs >= first.nowMs ? data : first, isSilent: useLive()?.isSilent ?? false }
}
