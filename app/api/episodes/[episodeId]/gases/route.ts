import { recordGasSchema } from '@/lib/schemas/gases'
import { handle } from '@/lib/server/http'
import { recordGas } from '@/lib/services/gases/record'

export const POST = handle({ input: recordGasSchema, run: recordGas })
