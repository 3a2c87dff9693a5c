import { createUnitSchema, listUnitsSchema } from '@/lib/schemas/units'
import { handle } from '@/lib/server/http'
import { createUnit } from '@/lib/services/units/create'
import { listUnitsForAdmin } from '@/lib/services/units/list'

export const GET = handle({ input: listUnitsSchema, run: listUnitsForAdmin })
export const POST = handle({ input: createUnitSchema, run: createUnit })
