import { reinvitePersonSchema } from '@/lib/schemas/people'
import { handle } from '@/lib/server/http'
import { reinvitePerson } from '@/lib/services/people/reinvite'

export const POST = handle({ input: reinvitePersonSchema, run: reinvitePerson })
