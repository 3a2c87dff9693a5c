import type { ClinicalRole } from '@/lib/weaning/vocabulary'
import { FAMILY_NAMES, GIVEN_NAMES } from './names'
import type { World } from './world'

export type DemoRole = ClinicalRole | 'administrator'
export type DemoAccount = { role: DemoRole; email: string; personId: string }

/** Which units a person works in: all, or the one at this place. */
type Works = 'all' | number
type Post = { email: string; roles: ClinicalRole[]; works: Works; signsIn: DemoRole | null }
const MAIL = 'kestrel-ridge.example'

/** One sign-in for each role, and a second bedside person each to hand over to. */
const SIGN_INS: Post[] = [
  { email: 'rt', roles: ['rt'], works: 'all', signsIn: 'rt' },
  { email: 'nurse', roles: ['nurse'], works: 'all', signsIn: 'nurse' },
  { email: 'physician', roles: ['physician'], works: 'all', signsIn: 'physician' },
  { email: 'lead', roles: ['unit_lead'], works: 'all', signsIn: 'unit_lead' },
  { email: 'admin', roles: [], works: 'all', signsIn: 'administrator' },
  { email: 'rt2', roles: ['rt'], works: 'all', signsIn: 'rt' },
  { email: 'nurse2', roles: ['nurse'], works: 0, signsIn: 'nurse' },
  { email: 'physician2', roles: ['physician'], works: 'all', signsIn: 'physician' },
]

const colleagues = (role: ClinicalRole, works: Works, count: number): Post[] =>
  Array.from({ length: count }, () => ({ email: '', roles: [role], works, signsIn: null }))

/** The rest of the staff is there as authors of two years of entries; their sign-ins are not printed. */
function posts(unitCount: number): Post[] {
  const ofUnits = Array.from({ length: unitCount }, (_, unit) => [
    ...colleagues('rt', unit, 2),
    ...colleagues('nurse', unit, 3),
    ...colleagues('physician', unit, 2),
    { email: '', roles: ['physician', 'unit_lead'] as ClinicalRole[], works: unit, signsIn: null },
  ])
  return [...SIGN_INS, ...ofUnits.flat()]
}

/** Adds people, their accounts without passwords, and their roles. Answers the accounts that sign in, and who leads and approves. */
export function addStaff(world: World): { accounts: DemoAccount[]; leadId: string; physicianId: string } {
  const accounts: DemoAccount[] = []
  const taken = new Set<string>()
  for (const post of posts(world.units.length)) {
    const name = newName(world, taken)
    const email = `${
      post.email ||
      name
        .toLowerCase()
        .normalize('NFD')
        .replace(/[^a-z]+/g, '.')
    }@${MAIL}`
    const personId = addPerson(world, name, email, post.signsIn === 'administrator')
    if (post.signsIn) accounts.push({ role: post.signsIn, email, personId })
    world.units.forEach((unit, index) => {
      if (post.works !== 'all' && post.works !== index) return
      for (const role of post.roles) {
        world.rows.memberships.push({
          id: world.random.id(),
          personId,
          unitId: unit.id,
          role,
          startedAt: world.calendar.at(0, 0),
          endedAt: null,
        })
        if (role !== 'unit_lead') unit.staff[role].push(personId)
      }
    })
  }
  return { accounts, leadId: idOf(accounts, 'unit_lead'), physicianId: idOf(accounts, 'physician') }
}

function idOf(accounts: DemoAccount[], role: DemoRole): string {
  const account = accounts.find((one) => one.role === role)
  if (!account) throw new Error(`Nobody signs in as ${role}.`)
  return account.personId
}

function newName({ random }: World, taken: Set<string>): string {
  for (;;) {
    const name = `${random.pick(random.chance(0.55) ? GIVEN_NAMES.female : GIVEN_NAMES.male)} ${random.pick(FAMILY_NAMES)}`
    if (taken.has(name)) continue
    taken.add(name)
    return name
  }
}

function addPerson({ rows, random, calendar, hospitalId }: World, name: string, email: string, isAdministrator: boolean): string {
  const id = random.id()
  const createdAt = calendar.at(0, 0)
  const created = new Date(createdAt)
  rows.user.push({ id, name, email, emailVerified: true, image: null, createdAt: created, updatedAt: created })
  rows.people.push({ id, hospitalId, name, isAdministrator, createdAt, deactivatedAt: null, version: 1 })
  return id
}
