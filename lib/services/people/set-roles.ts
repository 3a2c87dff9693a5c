import 'server-only'
import type { Tx } from '@/db/client'
import { countOtherAdministrators, updatePerson } from '@/db/queries/people'
import { authorize } from '@/lib/access/door'
import type { PersonDto, SetRolesInput } from '@/lib/schemas/people'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import { AppError } from '@/lib/shared/errors'
import { changeMemberships } from './change-memberships'
import { refuseStale } from './refuse-stale'
import { readPersonDto, rightsOf } from './to-person-dto'

/** Sets what a person may do: administration, and roles in units. Takes effect with the person's next request. */
export function setRoles(ctx: Ctx, input: SetRolesInput): PersonDto {
  const { hospitalId } = authorize(ctx, 'people.manage', 'hospital').actor
  return once(ctx, 'people.manage', input, (tx) => {
    const before = readPersonDto(tx, input.personId, hospitalId, ctx.now)
    if (before.state === 'deactivated')
      throw new AppError('PRECONDITION', 'This person is deactivated. Invite the person again first.')
    if (before.isAdministrator && !input.isAdministrator) refuseLastAdministrator(tx, before.id, hospitalId)
    refuseStale(updatePerson(tx, before.id, input.version, { isAdministrator: input.isAdministrator }))
    changeMemberships(tx, { personId: before.id, hospitalId, wanted: input.memberships, now: ctx.now })
    const person = readPersonDto(tx, before.id, hospitalId, ctx.now)
    writeAudit(tx, ctx, {
      action: 'person.set_roles',
      subject: { kind: 'person', id: person.id },
      before: rightsOf(before),
      after: rightsOf(person),
    })
    return person
  })
}

/** Somebody else who can act must be left; an invitation that nobody accepted does not count. */
// no-door: called by the verbs of this folder inside their own transaction, after their door
export function refuseLastAdministrator(tx: Tx, personId: string, hospitalId: string): void {
  if (countOtherAdministrators(tx, hospitalId, personId) > 0) return
  throw new AppError('PRECONDITION', 'This is the last administrator who can sign in. Make somebody else an administrator first.')
}
