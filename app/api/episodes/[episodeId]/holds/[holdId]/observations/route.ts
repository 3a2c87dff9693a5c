import { observeHoldSchema } from '@/lib/schemas/holds'
import { handle } from '@/lib/server/http'
import { observeHold } from '@/lib/services/holds/observe'

export const POST = handle({ input: observeHoldSchema, run: observeHold })
