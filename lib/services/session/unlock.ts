import 'server-only'
import { deleteSession, findSessionState, updateSessionState } from '@/db/queries/sessions'
import { authorize } from '@/lib/access/door'
import type { UnlockSessionInput } from '@/lib/schemas/session'
import { writeAudit } from '@/lib/server/audit'
import { isPasswordOf } from '@/lib/server/auth'
import type { Ctx, PersonCtx } from '@/lib/server/ctx'
import { AppError, invalidField } from '@/lib/shared/errors'

const MOST_FAILURES = 5

/**
 * Opens a locked screen with the password of the person whose session it is. The fifth wrong password ends the session; then the
 * person signs in again. Throws INVALID at the password field, or UNAUTHENTICATED once the session has ended.
 */
export async function unlockSession(ctx: Ctx, input: UnlockSessionInput): Promise<{ isLocked: false }> {
  const person = authorize(ctx, 'session.lock', 'self')
  const failures = countTry(person)
  if (await isPasswordOf(ctx.db, person.actor.personId, input.password)) {
    openScreen(person)
    return { isLocked: false }
  }
  const left = MOST_FAILURES - failures
  recordFailure(person, left)
  if (left <= 0)
    throw new AppError('UNAUTHENTICATED', 'That was the fifth wrong password, so this session has ended. Please sign in.')
  throw invalidField(
    'password',
    `That is not your password. ${left === 1 ? 'One try is' : `${left} tries are`} left before you are signed out.`,
  )
}

/** Counts a try before its password is checked, so that tries at the same moment are all counted. Answers how many there were. */
function countTry({ db, actor }: PersonCtx): number {
  return db.transaction(
    (tx) => {
      const state = findSessionState(tx, actor.sessionId)
      if (!state || state.failedUnlocks >= MOST_FAILURES)
        throw new AppError('UNAUTHENTICATED', 'This session has ended. Please sign in.')
      updateSessionState(tx, actor.sessionId, { failedUnlocks: state.failedUnlocks + 1 })
      return state.failedUnlocks + 1
    },
    { behavior: 'immediate' },
  )
}

function openScreen(ctx: PersonCtx): void {
  const { personId, sessionId } = ctx.actor
  ctx.db.transaction(
    (tx) => {
      updateSessionState(tx, sessionId, { lockedAt: null, failedUnlocks: 0, lastActiveAt: Date.now() })
      writeAudit(tx, ctx, { action: 'session.unlock', subject: { kind: 'person', id: personId } })
    },
    { behavior: 'immediate' },
  )
}

function recordFailure(ctx: PersonCtx, left: number): void {
  const { personId, sessionId } = ctx.actor
  ctx.db.transaction(
    (tx) => {
      if (left <= 0) deleteSession(tx, sessionId)
      writeAudit(tx, ctx, {
        action: left <= 0 ? 'session.ended_by_wrong_passwords' : 'session.unlock_failed',
        subject: { kind: 'person', id: personId },
      })
    },
    { behavior: 'immediate' },
  )
}
