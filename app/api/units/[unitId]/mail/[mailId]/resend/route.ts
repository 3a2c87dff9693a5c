import { mailOneSchema } from '@/lib/schemas/mail'
import { handle } from '@/lib/server/http'
import { resendMail } from '@/lib/services/mail/resend'

export const POST = handle({ input: mailOneSchema, run: resendMail })
