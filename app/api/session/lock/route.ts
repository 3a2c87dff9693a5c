import { lockSessionSchema } from '@/lib/schemas/session'
import { handle } from '@/lib/server/http'
import { lockSession } from '@/lib/services/session/lock'

export const POST = handle({ input: lockSessionSchema, run: lockSession, session: 'even_locked' })
