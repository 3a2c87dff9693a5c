import 'server-only'
import { hasAnyHospital } from '@/db/queries/people'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { AppError } from '@/lib/shared/errors'
import { createAccountLink } from './account-link'

/** The one-time link for the first administrator of an empty database, valid 24 h; an earlier one ends. Refused once a hospital exists. */
// no-door: called by the program at its start on an empty database, where nobody can be signed in
export function createSetupLink(ctx: Ctx): { url: string } {
  if (ctx.actor.kind !== 'system') throw new AppError('FORBIDDEN', 'Your role cannot do this.')
  return ctx.db.transaction(
    (tx) => {
      if (hasAnyHospital(tx)) throw new AppError('PRECONDITION', 'This database is set up already.')
      const url = createAccountLink(tx, { kind: 'setup', personId: null, now: ctx.now })
      writeAudit(tx, ctx, { action: 'setup.link_created' })
      return { url }
    },
    { behavior: 'immediate' },
  )
}
