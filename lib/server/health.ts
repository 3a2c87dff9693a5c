import 'server-only'
import { ping } from '@/db/queries/start'
import { requestDatabase } from './database'
import { log } from './log'

/** Whether the server and its database answer. For whoever watches over the machine: no session, and nothing about anybody. */
export function answerHealth(): Response {
  const headers = { 'cache-control': 'no-store' }
  try {
    ping(requestDatabase())
    return Response.json({ ok: true }, { headers })
  } catch (error) {
    log.error({ fault: error instanceof Error ? error.name : 'unknown' }, 'the database does not answer')
    return Response.json({ ok: false }, { status: 503, headers })
  }
}
