import { acceptLinkSchema } from '@/lib/schemas/people'
import { handle } from '@/lib/server/http'
import { acceptLink } from '@/lib/services/people/accept'

export const POST = handle({ input: acceptLinkSchema, run: acceptLink, session: 'none' })
