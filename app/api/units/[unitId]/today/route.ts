import { todayQuerySchema } from '@/lib/schemas/today'
import { handle } from '@/lib/server/http'
import { listToday } from '@/lib/services/today/list'

export const GET = handle({ input: todayQuerySchema, run: listToday })
