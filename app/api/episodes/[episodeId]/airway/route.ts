import { recordAirwaySchema } from '@/lib/schemas/airway'
import { handle } from '@/lib/server/http'
import { recordAirway } from '@/lib/services/airway/record'

export const POST = handle({ input: recordAirwaySchema, run: recordAirway })
