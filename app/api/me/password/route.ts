import { changePasswordSchema } from '@/lib/schemas/session'
import { handle } from '@/lib/server/http'
import { changePassword } from '@/lib/services/session/change-password'

export const POST = handle({ input: changePasswordSchema, run: changePassword })
