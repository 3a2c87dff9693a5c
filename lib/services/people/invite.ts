import 'server-only'
import { insertPerson } from '@/db/queries/people'
import { findUserByEmail } from '@/db/queries/sessions'
import { authorize } from '@/lib/access/door'
import type { InvitePersonInput, PersonDto } from '@/lib/schemas/people'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import { invalidField } from '@/lib/shared/errors'
import { newId } from '@/lib/shared/ids'
import { queueAccountMail } from '../mail/queue-account-mail'
import { createAccountLink } from './account-link'
import { changeMemberships } from './change-memberships'
import { readPersonDto, rightsOf } from './to-person-dto'

/** Creates an account without a password and mails the person a link, valid 7 days, on which to set one. */
export function invitePerson(ctx: Ctx, input: InvitePersonInput): PersonDto {
  const { hospitalId } = authorize(ctx, 'people.manage', 'hospital').actor
  return once(ctx, 'people.manage', input, (tx) => {
    if (findUserByEmail(tx, input.email)) {
      throw invalidField(
        'email',
        'This e-mail address already has an account. Look for it in the list, also among the deactivated.',
      )
    }
    const personId = newId()
    const { name, email, isAdministrator, memberships } = input
    insertPerson(tx, { id: personId, hospitalId, name, email, isAdministrator, now: ctx.now })
    changeMemberships(tx, { personId, hospitalId, wanted: memberships, now: ctx.now })
    const link = createAccountLink(tx, { kind: 'invitation', personId, now: ctx.now })
    queueAccountMail(tx, { kind: 'invitation', personId, recipient: email, link, now: ctx.now })
    const person = readPersonDto(tx, personId, hospitalId, ctx.now)
    writeAudit(tx, ctx, { action: 'person.invite', subject: { kind: 'person', id: personId }, after: rightsOf(person) })
    return person
  })
}
