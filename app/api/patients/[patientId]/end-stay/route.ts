import { endStaySchema } from '@/lib/schemas/stays'
import { handle } from '@/lib/server/http'
import { endStay } from '@/lib/services/stays/end'

export const POST = handle({ input: endStaySchema, run: endStay })
