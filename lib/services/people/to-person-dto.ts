import 'server-only'
import type { Tx } from '@/db/client'
import { findPersonOfHospital, listMembershipsOf, listOpenLinksOf, listPeopleOfHospital } from '@/db/queries/people'
import { listPeopleWithPassword } from '@/db/queries/sessions'
import type { PersonDto } from '@/lib/schemas/people'
import { AppError } from '@/lib/shared/errors'

type PersonWithEmail = ReturnType<typeof listPeopleOfHospital>[number]

/** People as their administration sees them, in the order given. `now` (UTC ms) tells which invitations are still open. */
export function toPersonDtos(tx: Tx, persons: readonly PersonWithEmail[], now: number): PersonDto[] {
  const ids = persons.map((person) => person.id)
  const held = listMembershipsOf(tx, ids)
  const links = listOpenLinksOf(tx, ids, now)
  const withPassword = listPeopleWithPassword(tx, ids)
  return persons.map(({ deactivatedAt, ...person }) => ({
    ...person,
    state: deactivatedAt !== null ? 'deactivated' : withPassword.has(person.id) ? 'active' : 'invited',
    invitationExpiresAt: links.find((link) => link.personId === person.id)?.expiresAt ?? null,
    memberships: held
      .filter((one) => one.personId === person.id)
      .map(({ unitId, unitName, role }) => ({ unitId, unitName, role })),
  }))
}

/** One person of the hospital; throws NOT_FOUND for anybody else. */
export function readPersonDto(tx: Tx, personId: string, hospitalId: string, now: number): PersonDto {
  const person = findPersonOfHospital(tx, personId, hospitalId)
  const [dto] = person ? toPersonDtos(tx, [person], now) : []
  if (!dto) throw new AppError('NOT_FOUND', 'Not found. The person may belong to another hospital.')
  return dto
}

/** What the audit log keeps of a person's rights: ids, no name and no address. */
export function rightsOf(person: PersonDto) {
  return {
    isAdministrator: person.isAdministrator,
    state: person.state,
    memberships: person.memberships.map(({ unitId, role }) => ({ unitId, role })),
  }
}
