import { observeTrialSchema } from '@/lib/schemas/trials'
import { handle } from '@/lib/server/http'
import { observeTrial } from '@/lib/services/trials/observe'

export const POST = handle({ input: observeTrialSchema, run: observeTrial })
