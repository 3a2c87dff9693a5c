import { unlockSessionSchema } from '@/lib/schemas/session'
import { handle } from '@/lib/server/http'
import { unlockSession } from '@/lib/services/session/unlock'

export const POST = handle({ input: unlockSessionSchema, run: unlockSession, session: 'even_locked' })
