import { setRolesSchema } from '@/lib/schemas/people'
import { handle } from '@/lib/server/http'
import { setRoles } from '@/lib/services/people/set-roles'

export const POST = handle({ input: setRolesSchema, run: setRoles })
