import 'server-only'
import { createHash } from 'node:crypto'
import type { Tx } from '@/db/client'
import { insertMailOnce } from '@/db/queries/mail'
import type { Message } from '@/lib/mail/message'
import { newId } from '@/lib/shared/ids'
import type { MailKind } from '@/lib/weaning/vocabulary'

type Envelope = {
  kind: MailKind
  unitId: string | null
  /** Local day of the unit, or of the server for account mail. */
  day: string
  /** What makes the message one of its kind: the day for a daily list, the trial for an owed decision, the link for an account. */
  occasion: string
  personId: string | null
  recipient: string
  now: number
}

/** Puts a message into the outbox, once for its unit, kind, occasion and recipient. True when it was new. Call it in the transaction of its cause. */
export function queueMessage(tx: Tx, envelope: Envelope, message: Message): boolean {
  const { kind, unitId, day, occasion, personId, recipient, now } = envelope
  const onceKey = [unitId ?? 'account', kind, occasion, recipient.toLowerCase()].join('|')
  // The same Message-ID whenever it is sent again, so that a receiver can tell a repeat.
  const messageId = `<${createHash('sha256').update(onceKey).digest('hex').slice(0, 32)}@daybreath>`
  return insertMailOnce(tx, {
    id: newId(),
    onceKey,
    unitId,
    kind,
    day,
    personId,
    recipient,
    messageId,
    state: 'queued',
    queuedAt: now,
    nextAttemptAt: now,
    subject: message.subject,
    bodyText: message.text,
    bodyHtml: message.html,
  })
}
