import 'server-only'
import { findMail, updateMail } from '@/db/queries/mail'
import { authorize } from '@/lib/access/door'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import { AppError } from '@/lib/shared/errors'

/** Puts a message that failed, or that nobody knows the fate of, back into the outbox under its first Message-ID. */
export function resendMail(ctx: Ctx, input: { unitId: string; mailId: string }): { state: 'queued' } {
  const { unit } = authorize(ctx, 'mail.schedule', { unitId: input.unitId })
  return once(ctx, 'mail.schedule', input, (tx) => {
    const mail = findMail(tx, input.mailId)
    if (!mail || mail.unitId !== unit.id) throw new AppError('NOT_FOUND', 'This message was not found in this unit.')
    if (mail.state !== 'failed' && mail.state !== 'unconfirmed') {
      throw new AppError('PRECONDITION', 'Only a message that failed or was not confirmed can be sent again.')
    }
    updateMail(tx, mail, { state: 'queued', attempts: 0, nextAttemptAt: ctx.now, claimedAt: null })
    writeAudit(tx, ctx, {
      action: 'mail.resend',
      unitId: unit.id,
      subject: { kind: 'mail', id: mail.id },
      before: { state: mail.state },
    })
    return { state: 'queued' }
  })
}
