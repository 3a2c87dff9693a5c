import { readMeSchema } from '@/lib/schemas/session'
import { handle } from '@/lib/server/http'
import { readMe } from '@/lib/services/session/read-me'

export const GET = handle({ input: readMeSchema, run: readMe, session: 'even_locked' })
