import { stepFormQuerySchema } from '@/lib/schemas/step-form'
import { startTrialSchema } from '@/lib/schemas/trials'
import { handle } from '@/lib/server/http'
import { readTrialForm } from '@/lib/services/trials/read-form'
import { startTrial } from '@/lib/services/trials/start'

export const GET = handle({ input: stepFormQuerySchema, run: readTrialForm })
export const POST = handle({ input: startTrialSchema, run: startTrial })
