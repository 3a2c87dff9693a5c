import { signDecisionSchema } from '@/lib/schemas/decisions'
import { stepFormQuerySchema } from '@/lib/schemas/step-form'
import { handle } from '@/lib/server/http'
import { readDecisionForm } from '@/lib/services/decisions/read-form'
import { signDecision } from '@/lib/services/decisions/sign'

export const GET = handle({ input: stepFormQuerySchema, run: readDecisionForm })
export const POST = handle({ input: signDecisionSchema, run: signDecision })
