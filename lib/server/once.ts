import 'server-only'
import { createHash } from 'node:crypto'
import type { Tx } from '@/db/client'
import { findIdempotencyKey, insertIdempotencyKey } from '@/db/queries/audit'
import { AppError } from '@/lib/shared/errors'
import type { Ctx } from './ctx'

/**
 * Runs a change in one immediate transaction. With an idempotency key, a repeat of the same request gets the first answer and
 * changes nothing; the same key with other input or for another action is a conflict. Call it after the door. `action` is the right that
 * was asked for, or a name of its own where several changes under one right take the same input.
 */
export function once<Answer>(ctx: Ctx, action: string, input: unknown, change: (tx: Tx) => Answer): Answer {
  return ctx.db.transaction(
    (tx) => {
      const { idempotencyKey, actor } = ctx
      if (idempotencyKey === null || actor.kind !== 'person') return change(tx)
      const key = `${actor.personId}:${idempotencyKey}`
      const inputHash = createHash('sha256').update(JSON.stringify(input)).digest('hex')
      const earlier = findIdempotencyKey(tx, key)
      if (earlier) {
        if (earlier.action !== action || earlier.inputHash !== inputHash) {
          throw new AppError(
            'CONFLICT',
            'This form was already sent with other values. Reload the page to see what was recorded.',
          )
        }
        return earlier.answer as Answer
      }
      const answer = change(tx)
      insertIdempotencyKey(tx, { key, personId: actor.personId, action, inputHash, answer, createdAt: ctx.now })
      return answer
    },
    { behavior: 'immediate' },
  )
}
