import { protocolQuerySchema } from '@/lib/schemas/protocols'
import { handle } from '@/lib/server/http'
import { readProtocol } from '@/lib/services/protocols/read'

export const GET = handle({ input: protocolQuerySchema, run: readProtocol })
