import { openRecordSchema } from '@/lib/schemas/openings'
import { handle } from '@/lib/server/http'
import { openRecord } from '@/lib/services/openings/open'

export const POST = handle({ input: openRecordSchema, run: openRecord })
