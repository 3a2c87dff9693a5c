import 'server-only'
import type { Tx } from '@/db/client'
import { findPerson } from '@/db/queries/access'
import { consumeAccountLink, hasAnyHospital, insertPerson, markEmailVerified, type AccountLinkRow } from '@/db/queries/people'
import { savePasswordHash } from '@/db/queries/sessions'
import { insertHospital } from '@/db/queries/units'
import type { AcceptLinkInput } from '@/lib/schemas/people'
import { writeAudit } from '@/lib/server/audit'
import { hashNewPassword } from '@/lib/server/auth'
import type { Ctx } from '@/lib/server/ctx'
import { readEnv } from '@/lib/server/env'
import { AppError } from '@/lib/shared/errors'
import { newId } from '@/lib/shared/ids'
import { findOpenLink } from './account-link'

type SetupInput = Extract<AcceptLinkInput, { kind: 'setup' }>

/**
 * Uses a one-time link: an invited person sets a password, or the first administrator also names the hospital and becomes its
 * administrator. Throws PRECONDITION when the link was used, ran out, or is of the other kind; then nothing is changed.
 */
// no-door: nobody is signed in yet, the unguessable one-time token is the door
export async function acceptLink(ctx: Ctx, input: AcceptLinkInput): Promise<{ ok: true }> {
  if (findOpenLink(ctx.db, input.token, ctx.now)?.kind !== input.kind) throw spentLink()
  const hash = await hashNewPassword(input.password)
  return ctx.db.transaction(
    (tx) => {
      const link = findOpenLink(tx, input.token, ctx.now)
      if (!link || link.kind !== input.kind || !consumeAccountLink(tx, link.id, ctx.now)) throw spentLink()
      const personId = input.kind === 'setup' ? createFirstAdministrator(tx, input, ctx.now) : findInvited(tx, link)
      savePasswordHash(tx, { id: newId(), personId, hash, now: ctx.now })
      if (input.kind === 'invitation') markEmailVerified(tx, personId, ctx.now)
      writeAudit(tx, ctx, {
        action: input.kind === 'setup' ? 'setup.accept' : 'person.accept',
        subject: { kind: 'person', id: personId },
      })
      return { ok: true as const }
    },
    { behavior: 'immediate' },
  )
}

function createFirstAdministrator(tx: Tx, input: SetupInput, now: number): string {
  if (hasAnyHospital(tx))
    throw new AppError('PRECONDITION', 'Daybreath is set up already. Ask an administrator for an invitation.')
  const hospitalId = newId()
  const personId = newId()
  insertHospital(tx, { id: hospitalId, name: input.hospitalName, isDemo: readEnv().isDemo, createdAt: now })
  insertPerson(tx, { id: personId, hospitalId, name: input.name, email: input.email, isAdministrator: true, now })
  return personId
}

function findInvited(tx: Tx, link: AccountLinkRow): string {
  const person = link.personId === null ? undefined : findPerson(tx, link.personId)
  if (!person || person.deactivatedAt !== null) throw spentLink()
  return person.id
}

function spentLink(): AppError {
  return new AppError('PRECONDITION', 'This link has run out or was already used. Ask your administrator for a new one.')
}
