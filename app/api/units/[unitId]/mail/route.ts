import { mailUnitSchema } from '@/lib/schemas/mail'
import { handle } from '@/lib/server/http'
import { readMail } from '@/lib/services/mail/read'

export const GET = handle({ input: mailUnitSchema, run: readMail })
