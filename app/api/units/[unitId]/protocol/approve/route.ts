import { approveProtocolSchema } from '@/lib/schemas/protocols'
import { handle } from '@/lib/server/http'
import { approveProtocol } from '@/lib/services/protocols/approve'

export const POST = handle({ input: approveProtocolSchema, run: approveProtocol })
