import { mkdir, rename, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import { createTransport, type Transporter } from 'nodemailer'

export type OutgoingMail = {
  from: string
  to: string
  subject: string
  text: string
  html: string
  messageId: string
  at: number
}
/** sent: a server took it. kept: written as a file, not sent. failed: not taken; permanent when trying again cannot help. */
export type DeliveryResult =
  { outcome: 'sent' } | { outcome: 'kept' } | { outcome: 'failed'; isPermanent: boolean; error: string }
export type MailTransport = { isFiles: boolean; deliver: (mail: OutgoingMail) => Promise<DeliveryResult>; close: () => void }

const toOptions = ({ at, ...mail }: OutgoingMail) => ({
  ...mail,
  date: new Date(at),
  headers: { 'Auto-Submitted': 'auto-generated' },
})

/** Sends over SMTP (smtp:// or smtps://, with credentials in the address when the server asks for them). */
export function smtpTransport(url: string): MailTransport {
  const transporter: Transporter = createTransport(url, {})
  const timeouts = { connectionTimeout: 15_000, greetingTimeout: 15_000, socketTimeout: 30_000 }
  Object.assign(transporter.options, timeouts)
  return {
    isFiles: false,
    async deliver(mail) {
      try {
        await transporter.sendMail(toOptions(mail))
        return { outcome: 'sent' }
      } catch (error) {
        return describeFailure(error)
      }
    },
    close: () => transporter.close(),
  }
}

function describeFailure(error: unknown): DeliveryResult {
  const { responseCode, code } = error as { responseCode?: number; code?: string }
  const isPermanent = responseCode !== undefined && responseCode >= 500
  // The server's own text can repeat an address, so only its code is kept.
  return {
    outcome: 'failed',
    isPermanent,
    error: responseCode ? `The mail server answered ${responseCode}.` : `No answer from the mail server (${code ?? 'unknown'}).`,
  }
}

/** Keeps each message as a file that any mail program opens; nothing is sent. */
export function fileTransport(folder: string): MailTransport {
  const transporter = createTransport({ streamTransport: true, buffer: true, newline: 'unix' })
  return {
    isFiles: true,
    async deliver(mail) {
      const { message } = await transporter.sendMail(toOptions(mail))
      await mkdir(folder, { recursive: true, mode: 0o700 })
      const name = `${new Date(mail.at).toISOString().replaceAll(':', '-')}-${mail.messageId.slice(1, 13)}.eml`
      await writeFile(join(folder, `.${name}`), message as Buffer, { mode: 0o600 })
      await rename(join(folder, `.${name}`), join(folder, name))
      return { outcome: 'kept' }
    },
    close: () => undefined,
  }
}
