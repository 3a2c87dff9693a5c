import { deactivatePersonSchema } from '@/lib/schemas/people'
import { handle } from '@/lib/server/http'
import { deactivatePerson } from '@/lib/services/people/deactivate'

export const POST = handle({ input: deactivatePersonSchema, run: deactivatePerson })
