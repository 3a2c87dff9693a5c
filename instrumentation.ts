import type { Instrumentation } from 'next'

/** Next calls this once when a server starts, and waits for it before it answers anything. Not during a build. */
export async function register(): Promise<void> {
  if (process.env.NEXT_RUNTIME !== 'nodejs') return
  const { boot } = await import('./lib/server/boot')
  boot()
}

/** A fault while a page was made: its number and the route's pattern go to the log, never its text or the address. */
export const onRequestError: Instrumentation.onRequestError = async (error, _request, context) => {
  if (process.env.NEXT_RUNTIME !== 'nodejs') return
  const { logPageFault } = await import('./lib/server/log')
  logPageFault(error, context.routePath)
}
