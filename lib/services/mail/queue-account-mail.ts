import 'server-only'
import { createHash } from 'node:crypto'
import type { Tx } from '@/db/client'
import { invitationMessage, passwordResetMessage } from '@/lib/mail/templates'
import { queueMessage } from './queue-message'

type AccountMail = { kind: 'invitation' | 'password_reset'; personId: string; recipient: string; link: string; now: number }

/** Queues the mail that carries a one-time link to a person's own account. */
// no-door: called by the verbs of accounts inside their own transaction, after their door
export function queueAccountMail(tx: Tx, { kind, personId, recipient, link, now }: AccountMail): void {
  const message = kind === 'invitation' ? invitationMessage({ url: link }) : passwordResetMessage({ url: link })
  const occasion = createHash('sha256').update(link).digest('hex')
  const day = new Date(now).toISOString().slice(0, 10)
  queueMessage(tx, { kind, unitId: null, day, occasion, personId, recipient, now }, message)
}
