import { recordScreenSchema } from '@/lib/schemas/screens'
import { stepFormQuerySchema } from '@/lib/schemas/step-form'
import { handle } from '@/lib/server/http'
import { readScreenForm } from '@/lib/services/screens/read-form'
import { recordScreen } from '@/lib/services/screens/record'

export const GET = handle({ input: stepFormQuerySchema, run: readScreenForm })
export const POST = handle({ input: recordScreenSchema, run: recordScreen })
