import { listOpeningsSchema } from '@/lib/schemas/openings'
import { handle } from '@/lib/server/http'
import { listOpenings } from '@/lib/services/openings/list'

export const GET = handle({ input: listOpeningsSchema, run: listOpenings })
