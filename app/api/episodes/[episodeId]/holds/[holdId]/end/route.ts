import { endHoldSchema } from '@/lib/schemas/holds'
import { handle } from '@/lib/server/http'
import { endHold } from '@/lib/services/holds/end'

export const POST = handle({ input: endHoldSchema, run: endHold })
