import { startHoldSchema } from '@/lib/schemas/holds'
import { stepFormQuerySchema } from '@/lib/schemas/step-form'
import { handle } from '@/lib/server/http'
import { readHoldForm } from '@/lib/services/holds/read-form'
import { recordHoldStart } from '@/lib/services/holds/record-start'

export const GET = handle({ input: stepFormQuerySchema, run: readHoldForm })
export const POST = handle({ input: startHoldSchema, run: recordHoldStart })
