import { endTrialSchema } from '@/lib/schemas/trials'
import { handle } from '@/lib/server/http'
import { endTrial } from '@/lib/services/trials/end'

export const POST = handle({ input: endTrialSchema, run: endTrial })
