import 'server-only'
import pino from 'pino'
import { readLogLevel } from './env'

/** Structured log to standard output. Ids and codes only: never a name, a record number or a reading. */
export const log = pino({ level: readLogLevel(), base: null, timestamp: pino.stdTimeFunctions.isoTime })

/** Logs a fault in a page by the digest that the person sees, and by the route's pattern. */
export function logPageFault(error: unknown, routePath: string): void {
  const digest = typeof error === 'object' && error !== null && 'digest' in error ? String(error.digest) : null
  log.error({ digest, routePath, fault: error instanceof Error ? error.name : 'unknown' }, 'page fault')
}
