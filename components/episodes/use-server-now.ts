'use client'

import { useEffect, useState } from 'react'

/**
 * The server's clock, ticking once a second in the browser. It starts from the moment the server gave with its answer and counts on with
 * the browser's steady timer, so that a device whose clock is wrong still shows the right elapsed time. UTC milliseconds.
 */
export function useServerNow(serverNowMs: number): number {
  const [elapsed, setElapsed] = useState({ since: serverNowMs, ms: 0 })
  useEffect(() => {
    const received = performance.now()
    const timer = setInterval(() => setElapsed({ since: serverNowMs, ms: performance.now() - received }), 1000)
    return () => clearInterval(timer)
  }, [serverNowMs])
  return serverNowMs + (elapsed.since === serverNowMs ? elapsed.ms : 0)
}
