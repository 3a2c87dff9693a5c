import 'server-only'
import { deleteSessionsOf, savePasswordHash } from '@/db/queries/sessions'
import { authorize } from '@/lib/access/door'
import type { ChangePasswordInput } from '@/lib/schemas/session'
import { writeAudit } from '@/lib/server/audit'
import { hashNewPassword, verifyOwnPassword } from '@/lib/server/auth'
import type { Ctx } from '@/lib/server/ctx'
import { invalidField } from '@/lib/shared/errors'
import { newId } from '@/lib/shared/ids'

/** Replaces the person's own password and signs out every other session. No idempotency key: its hash would be one of the password. */
export async function changePassword(ctx: Ctx, input: ChangePasswordInput): Promise<{ otherSessionsEnded: number }> {
  const person = authorize(ctx, 'password.change', 'self')
  if (!(await verifyOwnPassword(person, input.currentPassword))) {
    throw invalidField('currentPassword', 'That is not your present password.')
  }
  const { personId, sessionId } = person.actor
  const hash = await hashNewPassword(input.newPassword)
  return ctx.db.transaction(
    (tx) => {
      savePasswordHash(tx, { id: newId(), personId, hash, now: ctx.now })
      const otherSessionsEnded = deleteSessionsOf(tx, personId, sessionId)
      writeAudit(tx, ctx, { action: 'password.change', subject: { kind: 'person', id: personId }, after: { otherSessionsEnded } })
      return { otherSessionsEnded }
    },
    { behavior: 'immediate' },
  )
}
