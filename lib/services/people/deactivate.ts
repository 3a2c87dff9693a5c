import 'server-only'
import { expireAccountLinks, updatePerson } from '@/db/queries/people'
import { deleteSessionsOf } from '@/db/queries/sessions'
import { authorize } from '@/lib/access/door'
import type { DeactivatePersonInput, PersonDto } from '@/lib/schemas/people'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import { AppError } from '@/lib/shared/errors'
import { changeMemberships } from './change-memberships'
import { refuseStale } from './refuse-stale'
import { refuseLastAdministrator } from './set-roles'
import { readPersonDto, rightsOf } from './to-person-dto'

/** Ends an account at once: sessions, roles, open invitation. What the person recorded stays, with the name. */
export function deactivatePerson(ctx: Ctx, input: DeactivatePersonInput): PersonDto {
  const { hospitalId } = authorize(ctx, 'people.manage', 'hospital').actor
  return once(ctx, 'person.deactivate', input, (tx) => {
    const before = readPersonDto(tx, input.personId, hospitalId, ctx.now)
    if (before.state === 'deactivated') throw new AppError('PRECONDITION', 'This person is deactivated already.')
    if (before.isAdministrator) refuseLastAdministrator(tx, before.id, hospitalId)
    refuseStale(updatePerson(tx, before.id, input.version, { deactivatedAt: ctx.now }))
    changeMemberships(tx, { personId: before.id, hospitalId, wanted: [], now: ctx.now })
    expireAccountLinks(tx, before.id, ctx.now)
    const sessionsEnded = deleteSessionsOf(tx, before.id)
    const person = readPersonDto(tx, before.id, hospitalId, ctx.now)
    writeAudit(tx, ctx, {
      action: 'person.deactivate',
      subject: { kind: 'person', id: person.id },
      before: rightsOf(before),
      after: { ...rightsOf(person), sessionsEnded },
    })
    return person
  })
}
