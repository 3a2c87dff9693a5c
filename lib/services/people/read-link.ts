import 'server-only'
import { findPerson } from '@/db/queries/access'
import { findPersonOfHospital } from '@/db/queries/people'
import { findHospital } from '@/db/queries/units'
import type { AccountLinkDto } from '@/lib/schemas/people'
import { requestDatabase } from '@/lib/server/database'
import { findOpenLink } from './account-link'

/** What stands behind a one-time link, for its page; null when it was used, ran out, or never was. The token itself is the key. */
export function readLink(token: string, db = requestDatabase(), now = Date.now()): AccountLinkDto | null {
  const link = findOpenLink(db, token, now)
  if (!link) return null
  if (link.kind === 'setup') return { kind: 'setup' }
  const person = link.personId === null ? undefined : findPerson(db, link.personId)
  const hospital = person && findHospital(db, person.hospitalId)
  const withEmail = person && findPersonOfHospital(db, person.id, person.hospitalId)
  if (!person || !hospital || !withEmail || person.deactivatedAt !== null) return null
  return { kind: 'invitation', name: person.name, email: withEmail.email, hospitalName: hospital.name }
}
