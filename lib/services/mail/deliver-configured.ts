import 'server-only'
import { fileTransport, smtpTransport, type MailTransport } from '@/lib/mail/transport'
import type { Ctx } from '@/lib/server/ctx'
import { readEnv } from '@/lib/server/env'
import { deliverMail } from './deliver'

const shared = globalThis as typeof globalThis & { daybreathMail?: MailTransport }

/** Sends the outbox through what the environment names: an SMTP server, or files when there is none. */
// no-door: deliverMail refuses everything but the job
export function deliverConfiguredMail(ctx: Ctx) {
  const { smtpUrl, mailFolder, mailFrom } = readEnv()
  shared.daybreathMail ??= smtpUrl === null ? fileTransport(mailFolder) : smtpTransport(smtpUrl)
  return deliverMail(ctx, shared.daybreathMail, mailFrom)
}
