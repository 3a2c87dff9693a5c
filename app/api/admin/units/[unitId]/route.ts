import { updateUnitSchema } from '@/lib/schemas/units'
import { handle } from '@/lib/server/http'
import { updateUnit } from '@/lib/services/units/update'

export const POST = handle({ input: updateUnitSchema, run: updateUnit })
