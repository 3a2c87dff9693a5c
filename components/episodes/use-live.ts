'use client'

import { useQuery, type QueryKey } from '@tanstack/react-query'
import { useEffect } from 'react'
import { apiGet } from '@/lib/client/api'
import { startWatching } from '@/lib/client/live'

/** A colleague's entry shows within this time, in milliseconds. */
const EVERY_MS = 3_500

export type Live<Dto> = {
  data: Dto
  /** The last look at the server failed; what stands here may be out of date. */
  isStale: boolean
  readAgain: () => void
}

/** Keeps what the server gave with the page up to date. `isOn` false: shown once as it came, never asked for again. */
export function useLive<Dto>(queryKey: QueryKey, path: string, initial: Dto, isOn = true): Live<Dto> {
  useEffect(() => (isOn ? startWatching(Date.now()) : undefined), [isOn])
  const query = useQuery({
    queryKey,
    queryFn: ({ signal }) => apiGet<Dto>(path, { signal }),
    initialData: initial,
    refetchInterval: EVERY_MS,
    enabled: isOn,
    // Nothing of a patient is kept once the page is left, and the next page starts from what the server gave with it.
    gcTime: 0,
  })
  return { data: query.data ?? initial, isStale: query.isError, readAgain: () => void query.refetch() }
}
