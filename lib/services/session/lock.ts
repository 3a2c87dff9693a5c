import 'server-only'
import { findSessionState, updateSessionState } from '@/db/queries/sessions'
import { authorize } from '@/lib/access/door'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'

/** Locks the screen of this session until the password is given again. Locking a locked screen changes nothing. */
export function lockSession(ctx: Ctx): { isLocked: true } {
  const { actor } = authorize(ctx, 'session.lock', 'self')
  return once(ctx, 'session.lock', {}, (tx) => {
    if (findSessionState(tx, actor.sessionId)?.lockedAt === null) {
      updateSessionState(tx, actor.sessionId, { lockedAt: ctx.now })
      writeAudit(tx, ctx, { action: 'session.lock', subject: { kind: 'person', id: actor.personId } })
    }
    return { isLocked: true as const }
  })
}
