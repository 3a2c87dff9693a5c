import 'server-only'
import { updatePerson } from '@/db/queries/people'
import { deletePassword } from '@/db/queries/sessions'
import { authorize } from '@/lib/access/door'
import type { PersonDto, ReinvitePersonInput } from '@/lib/schemas/people'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import { AppError } from '@/lib/shared/errors'
import { queueAccountMail } from '../mail/queue-account-mail'
import { createAccountLink } from './account-link'
import { refuseStale } from './refuse-stale'
import { readPersonDto, rightsOf } from './to-person-dto'

/**
 * Mails a new link to somebody who has not set a password yet; the earlier link ends. A deactivated person comes back this way:
 * without the old password, without roles and without administration until those are given again.
 */
export function reinvitePerson(ctx: Ctx, input: ReinvitePersonInput): PersonDto {
  const { hospitalId } = authorize(ctx, 'people.manage', 'hospital').actor
  return once(ctx, 'person.reinvite', input, (tx) => {
    const before = readPersonDto(tx, input.personId, hospitalId, ctx.now)
    if (before.state === 'active') {
      throw new AppError('PRECONDITION', 'This person has a password already. A forgotten one is replaced on the sign-in page.')
    }
    const isBack = before.state === 'deactivated'
    refuseStale(updatePerson(tx, before.id, input.version, isBack ? { deactivatedAt: null, isAdministrator: false } : {}))
    if (isBack) deletePassword(tx, before.id)
    const link = createAccountLink(tx, { kind: 'invitation', personId: before.id, now: ctx.now })
    queueAccountMail(tx, { kind: 'invitation', personId: before.id, recipient: before.email, link, now: ctx.now })
    const person = readPersonDto(tx, before.id, hospitalId, ctx.now)
    writeAudit(tx, ctx, {
      action: 'person.reinvite',
      subject: { kind: 'person', id: person.id },
      before: rightsOf(before),
      after: rightsOf(person),
    })
    return person
  })
}
