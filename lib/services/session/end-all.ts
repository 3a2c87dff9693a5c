import 'server-only'
import { deleteSessionsOf } from '@/db/queries/sessions'
import { authorize } from '@/lib/access/door'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { AppError } from '@/lib/shared/errors'

/** Signs the person out everywhere, here included. */
export function endAllSessions(ctx: Ctx): { ended: number } {
  const { actor } = authorize(ctx, 'session.end_all', 'self')
  return ctx.db.transaction(
    (tx) => {
      const ended = deleteSessionsOf(tx, actor.personId)
      if (ended === 0) throw new AppError('UNAUTHENTICATED', 'You are signed out already.')
      writeAudit(tx, ctx, { action: 'session.end_all', subject: { kind: 'person', id: actor.personId }, after: { ended } })
      return { ended }
    },
    { behavior: 'immediate' },
  )
}
