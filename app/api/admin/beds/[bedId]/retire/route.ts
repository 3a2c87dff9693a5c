import { retireBedSchema } from '@/lib/schemas/units'
import { handle } from '@/lib/server/http'
import { retireBed } from '@/lib/services/units/retire-bed'

export const POST = handle({ input: retireBedSchema, run: retireBed })
