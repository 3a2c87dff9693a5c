import { endSessionsSchema } from '@/lib/schemas/session'
import { handle } from '@/lib/server/http'
import { endAllSessions } from '@/lib/services/session/end-all'

export const POST = handle({ input: endSessionsSchema, run: endAllSessions })
