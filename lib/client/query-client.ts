import { QueryClient } from '@tanstack/react-query'

/** Reads are repeated by the page's own polling; a write is sent at once or fails at once, and is never queued to go out later. */
export function makeQueryClient(): QueryClient {
  return new QueryClient({
    defaultOptions: {
      queries: { staleTime: 2_000, retry: false, networkMode: 'always', refetchOnWindowFocus: true },
      mutations: { retry: false, networkMode: 'always' },
    },
  })
}
