import { addBedsSchema } from '@/lib/schemas/units'
import { handle } from '@/lib/server/http'
import { addBeds } from '@/lib/services/units/add-beds'

export const POST = handle({ input: addBedsSchema, run: addBeds })
