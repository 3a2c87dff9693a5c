import 'server-only'
import { findNextQueuedMail, listStaleClaims, updateMail, type MailRow } from '@/db/queries/mail'
import type { DeliveryResult, MailTransport } from '@/lib/mail/transport'
import type { Ctx } from '@/lib/server/ctx'
import { MINUTE_MS } from '@/lib/shared/time'
import { AppError } from '@/lib/shared/errors'

/** Pauses before the second, third, … attempt; after the last one the message has failed. */
const PAUSES_MIN = [1, 5, 15, 60]
/** A claim older than this belongs to a process that died: nobody knows whether the server took the message. */
export const STALE_CLAIM_MS = 5 * MINUTE_MS
const MOST_PER_RUN = 200

/**
 * Sends what is queued and due, one message after another. Each is claimed in its own transaction before it is sent and confirmed after,
 * so that several processes never send one twice. A crash in between leaves it unconfirmed, for a person to decide; it is not sent again by itself.
 */
// no-door: run by the mail.deliver job only; it acts on the outbox, whose rows were queued behind the doors of their verbs
export async function deliverMail(ctx: Ctx, transport: MailTransport, from: string, clock: () => number = Date.now) {
  if (ctx.actor.kind !== 'job') throw new AppError('FORBIDDEN', 'Only the scheduled job sends mail.')
  markUnconfirmed(ctx)
  const counts = { sent: 0, kept: 0, failed: 0 }
  for (let done = 0; done < MOST_PER_RUN; done += 1) {
    const claimed = claimNext(ctx, clock())
    if (!claimed) break
    const result = await transport.deliver({
      from,
      to: claimed.recipient,
      subject: claimed.subject,
      text: claimed.bodyText,
      html: claimed.bodyHtml,
      messageId: claimed.messageId,
      at: claimed.queuedAt,
    })
    counts[result.outcome] += 1
    confirm(ctx, claimed, result, clock())
  }
  return counts
}

function markUnconfirmed(ctx: Ctx): void {
  for (const row of listStaleClaims(ctx.db, ctx.now - STALE_CLAIM_MS)) {
    updateMail(ctx.db, row, {
      state: 'unconfirmed',
      lastError: 'The program stopped while this was being sent. It may or may not have arrived.',
    })
  }
}

function claimNext(ctx: Ctx, now: number): MailRow | null {
  return ctx.db.transaction(
    (tx) => {
      const row = findNextQueuedMail(tx, now)
      if (!row) return null
      const change = { state: 'sending', claimedAt: now, attempts: row.attempts + 1 } as const
      return updateMail(tx, row, change) ? { ...row, ...change } : null
    },
    { behavior: 'immediate' },
  )
}

const LINK_REMOVED = 'The one-time link was removed from the ledger when the message left.'

function confirm(ctx: Ctx, row: MailRow, result: DeliveryResult, now: number): void {
  if (result.outcome !== 'failed') {
    // Account mail carries a working link: it does not stay in the database once it is out.
    const redacted = row.unitId === null ? { bodyText: LINK_REMOVED, bodyHtml: '' } : {}
    updateMail(ctx.db, row, { state: result.outcome, sentAt: now, lastError: null, ...redacted })
    return
  }
  const pauseMin = PAUSES_MIN[row.attempts - 1]
  if (result.isPermanent || pauseMin === undefined) updateMail(ctx.db, row, { state: 'failed', lastError: result.error })
  else updateMail(ctx.db, row, { state: 'queued', nextAttemptAt: now + pauseMin * MINUTE_MS, lastError: result.error })
}
