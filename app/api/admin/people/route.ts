import { invitePersonSchema, listPeopleSchema } from '@/lib/schemas/people'
import { handle } from '@/lib/server/http'
import { invitePerson } from '@/lib/services/people/invite'
import { listPeople } from '@/lib/services/people/list'

export const GET = handle({ input: listPeopleSchema, run: listPeople })
export const POST = handle({ input: invitePersonSchema, run: invitePerson })
