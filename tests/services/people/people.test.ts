import { eq } from 'drizzle-orm'
import { beforeEach, describe, expect, it } from 'vitest'
import type { Db } from '@/db/client'
import { savePasswordHash } from '@/db/queries/sessions'
import { accountLinks, auditLog, hospitals, mailLedger, memberships, people, session, sessionStates, user } from '@/db/schema'
import { acceptLinkSchema, invitePersonSchema, type InvitePersonInput } from '@/lib/schemas/people'
import { isPasswordOf, systemCtx } from '@/lib/server/auth'
import { acceptLink } from '@/lib/services/people/accept'
import { createSetupLink } from '@/lib/services/people/create-setup-link'
import { deactivatePerson } from '@/lib/services/people/deactivate'
import { invitePerson } from '@/lib/services/people/invite'
import { listPeople } from '@/lib/services/people/list'
import { readLink } from '@/lib/services/people/read-link'
import { reinvitePerson } from '@/lib/services/people/reinvite'
import { setRoles } from '@/lib/services/people/set-roles'
import { AppError } from '@/lib/shared/errors'
import { newId } from '@/lib/shared/ids'
import { HOUR_MS } from '@/lib/shared/time'
import { openTestDatabase } from '../../helpers/database'
import { auditRows, makeCtx, makeHospital, makePerson, makeUnit, makeWorld, NOW, type TestPerson } from '../../helpers/factories'
import { makeSession, serveDatabase } from '../../helpers/test-server'

const DAY_MS = 24 * HOUR_MS
let db: Db
let world: ReturnType<typeof makeWorld>
let elsewhere: { hospitalId: string; unitId: string; person: TestPerson; administrator: TestPerson }

beforeEach(() => {
  world = makeWorld()
  db = world.db
  serveDatabase(db)
  givePassword(world.administrator)
  const hospital = makeHospital(db)
  const { unit } = makeUnit(db, hospital.id)
  elsewhere = {
    hospitalId: hospital.id,
    unitId: unit.id,
    person: makePerson(db, hospital.id, [{ unitId: unit.id, role: 'nurse' }]),
    administrator: makePerson(db, hospital.id, [], { isAdministrator: true }),
  }
  givePassword(elsewhere.administrator)
})

const givePassword = (person: TestPerson) =>
  savePasswordHash(db, { id: newId(), personId: person.id, hash: 'salt:hash', now: NOW })
const asAdministrator = (now = NOW, key: string | null = null) => makeCtx(db, world.administrator, now, { idempotencyKey: key })
const codeOf = (run: () => unknown): string => {
  try {
    run()
  } catch (error) {
    return error instanceof AppError ? error.code : `not an AppError: ${String(error)}`
  }
  return 'OK'
}
const versionOf = (personId: string) => db.select().from(people).where(eq(people.id, personId)).get()?.version ?? 0
const invitation = (over: Partial<InvitePersonInput> = {}): InvitePersonInput => ({
  name: 'Sasha Newcomer',
  email: 'sasha@example.invalid',
  isAdministrator: false,
  memberships: [{ unitId: world.medical.unit.id, role: 'nurse' }],
  ...over,
})
const latestLink = () => {
  const mails = db.select().from(mailLedger).all()
  const url = /https?:\/\/\S+/.exec(mails.at(-1)?.bodyText ?? '')?.[0] ?? ''
  return new URL(url).searchParams.get('token') ?? ''
}
const counts = () => ({
  users: db.select().from(user).all().length,
  people: db.select().from(people).all().length,
  memberships: db.select().from(memberships).all().length,
  links: db.select().from(accountLinks).all().length,
  mails: db.select().from(mailLedger).all().length,
})

describe('who may manage people', () => {
  const verbs: [string, (ctx: ReturnType<typeof makeCtx>) => unknown][] = [
    ['list', (ctx) => listPeople(ctx)],
    ['invite', (ctx) => invitePerson(ctx, invitation())],
    ['set roles', (ctx) => setRoles(ctx, { personId: world.nurse.id, version: 1, isAdministrator: true, memberships: [] })],
    ['deactivate', (ctx) => deactivatePerson(ctx, { personId: world.nurse.id, version: 1 })],
    ['reinvite', (ctx) => reinvitePerson(ctx, { personId: world.nurse.id, version: 1 })],
  ]
  it.each(verbs)('refuses to %s as RT, nurse, physician or unit lead, logs it, and changes nothing', (_name, verb) => {
    const before = counts()
    for (const person of [world.rt, world.nurse, world.physician, world.lead]) {
      expect(codeOf(() => verb(makeCtx(db, person)))).toBe('FORBIDDEN')
    }
    expect(counts()).toEqual(before)
    expect(auditRows(db, 'access.denied').map((row) => row.actorId)).toEqual([
      world.rt.id,
      world.nurse.id,
      world.physician.id,
      world.lead.id,
    ])
  })

  it('refuses jobs and the program itself', () => {
    expect(codeOf(() => listPeople(systemCtx(db, NOW)))).toBe('FORBIDDEN')
    expect(codeOf(() => listPeople({ ...systemCtx(db, NOW), actor: { kind: 'job', name: 'x' } }))).toBe('FORBIDDEN')
  })

  it('does not find people and units of another hospital', () => {
    const personId = elsewhere.person.id
    expect(codeOf(() => setRoles(asAdministrator(), { personId, version: 1, isAdministrator: true, memberships: [] }))).toBe(
      'NOT_FOUND',
    )
    expect(codeOf(() => deactivatePerson(asAdministrator(), { personId, version: 1 }))).toBe('NOT_FOUND')
    expect(codeOf(() => reinvitePerson(asAdministrator(), { personId, version: 1 }))).toBe('NOT_FOUND')
    const wanted = [{ unitId: elsewhere.unitId, role: 'physician' as const }]
    const before = counts()
    expect(codeOf(() => invitePerson(asAdministrator(), invitation({ memberships: wanted })))).toBe('NOT_FOUND')
    expect(
      codeOf(() =>
        setRoles(asAdministrator(), { personId: world.nurse.id, version: 1, isAdministrator: false, memberships: wanted }),
      ),
    ).toBe('NOT_FOUND')
    expect(counts()).toEqual(before)
    expect(versionOf(world.nurse.id)).toBe(1)
  })

  it('lists the own hospital only, and nothing about any patient', () => {
    const text = JSON.stringify(listPeople(asAdministrator()))
    for (const person of [world.rt, world.nurse, world.physician, world.lead, world.outsider, world.administrator])
      expect(text).toContain(person.id)
    expect(text).not.toContain(elsewhere.person.id)
    expect(text).not.toContain(elsewhere.unitId)
    for (const secret of [world.patient.familyName, world.patient.recordNumber, world.patient.id, world.episode.id])
      expect(text).not.toContain(secret)
  })
})

describe('inviting', () => {
  it('creates an account without a password, with its roles, a link for 7 days, a mail and an audit row', () => {
    const person = invitePerson(asAdministrator(), invitation())
    expect(person).toMatchObject({
      state: 'invited',
      invitationExpiresAt: NOW + 7 * DAY_MS,
      memberships: [{ unitName: 'Medical ICU', role: 'nurse' }],
    })
    expect(
      db
        .select()
        .from(mailLedger)
        .all()
        .map((mail) => [mail.kind, mail.recipient, mail.personId]),
    ).toEqual([['invitation', 'sasha@example.invalid', person.id]])
    expect(auditRows(db, 'person.invite').map((row) => [row.actorId, row.subjectId])).toEqual([
      [world.administrator.id, person.id],
    ])
  })

  it('keeps only a hash of the link, and no address in the audit log', () => {
    invitePerson(asAdministrator(), invitation())
    expect(JSON.stringify(db.select().from(accountLinks).all())).not.toContain(latestLink())
    expect(JSON.stringify(db.select().from(auditLog).all())).not.toContain('sasha@')
  })

  it('refuses an address that has an account, here or in another hospital, and leaves nothing behind', () => {
    invitePerson(asAdministrator(), invitation())
    const before = counts()
    expect(codeOf(() => invitePerson(asAdministrator(), invitation({ name: 'Again' })))).toBe('INVALID')
    expect(
      codeOf(() => invitePerson(makeCtx(db, elsewhere.administrator), invitation({ memberships: [], isAdministrator: true }))),
    ).toBe('INVALID')
    expect(counts()).toEqual(before)
  })

  it('invites once when the same request comes twice', () => {
    const first = invitePerson(asAdministrator(NOW, 'key'), invitation())
    expect(invitePerson(asAdministrator(NOW, 'key'), invitation())).toEqual(first)
    expect(db.select().from(mailLedger).all()).toHaveLength(1)
  })

  it('needs a role or administration, a name, and a readable address', () => {
    const parse = (over: object) => invitePersonSchema.safeParse({ ...invitation(), ...over })
    expect(parse({ memberships: [] }).error?.issues[0]?.path).toEqual(['memberships'])
    expect(parse({ memberships: [], isAdministrator: true }).success).toBe(true)
    expect(parse({ name: '   ' }).success).toBe(false)
    expect(parse({ email: 'not an address' }).success).toBe(false)
    expect(parse({ email: ' Sasha@Example.Invalid ' }).data?.email).toBe('sasha@example.invalid')
    const twice = [
      { unitId: 'u', role: 'rt' },
      { unitId: 'u', role: 'rt' },
    ]
    expect(parse({ memberships: twice }).data?.memberships).toHaveLength(1)
    expect(parse({ memberships: [{ unitId: 'u', role: 'administrator' }] }).success).toBe(false)
  })
})

describe('accepting an invitation', () => {
  const accept = (token: string, over: object = {}, now = NOW) =>
    acceptLink(
      systemCtx(db, now),
      acceptLinkSchema.parse({ kind: 'invitation', token, password: 'a long enough sentence', ...over }),
    )

  it('sets the password, once, and the person becomes active', async () => {
    const person = invitePerson(asAdministrator(), invitation())
    const token = latestLink()
    expect(readLink(token, db, NOW)).toEqual({
      kind: 'invitation',
      name: 'Sasha Newcomer',
      email: 'sasha@example.invalid',
      hospitalName: world.hospital.name,
    })
    await accept(token)
    expect(await isPasswordOf(db, person.id, 'a long enough sentence')).toBe(true)
    expect(listPeople(asAdministrator()).people.find((one) => one.id === person.id)?.state).toBe('active')
    expect(auditRows(db, 'person.accept').map((row) => row.subjectId)).toEqual([person.id])
    expect(readLink(token, db, NOW)).toBeNull()
    await expect(accept(token, { password: 'somebody else’s sentence' })).rejects.toMatchObject({ code: 'PRECONDITION' })
    expect(await isPasswordOf(db, person.id, 'a long enough sentence')).toBe(true)
  })

  it('lets only one of two at the same moment through', async () => {
    invitePerson(asAdministrator(), invitation())
    const token = latestLink()
    const answers = await Promise.allSettled([accept(token), accept(token, { password: 'another long sentence' })])
    expect(answers.filter((answer) => answer.status === 'fulfilled')).toHaveLength(1)
    expect(auditRows(db, 'person.accept')).toHaveLength(1)
  })

  it('ends after 7 days, with a newer invitation, and with deactivation', async () => {
    const person = invitePerson(asAdministrator(), invitation())
    const first = latestLink()
    await expect(accept(first, {}, NOW + 7 * DAY_MS)).rejects.toMatchObject({ code: 'PRECONDITION' })
    reinvitePerson(asAdministrator(NOW + 1), { personId: person.id, version: 1 })
    await expect(accept(first, {}, NOW + 2)).rejects.toMatchObject({ code: 'PRECONDITION' })
    const second = latestLink()
    deactivatePerson(asAdministrator(NOW + 3), { personId: person.id, version: 2 })
    await expect(accept(second, {}, NOW + 4)).rejects.toMatchObject({ code: 'PRECONDITION' })
    expect(readLink(second, db, NOW + 4)).toBeNull()
  })

  it('opens nothing with an unknown token, and does not make an invitation into a set-up', async () => {
    await expect(accept('x'.repeat(43))).rejects.toMatchObject({ code: 'PRECONDITION' })
    invitePerson(asAdministrator(), invitation())
    const setup = { kind: 'setup', hospitalName: 'Elsewhere', name: 'Mallory', email: 'mallory@example.invalid' }
    await expect(accept(latestLink(), setup)).rejects.toMatchObject({ code: 'PRECONDITION' })
    expect(db.select().from(user).where(eq(user.email, 'mallory@example.invalid')).all()).toEqual([])
  })

  it('asks for at least 12 characters, five of them different', () => {
    const parse = (password: string) =>
      acceptLinkSchema.safeParse({ kind: 'invitation', token: 'x'.repeat(43), password }).success
    expect([parse('elevenchars'), parse('twelve chars'), parse('aaaaaaaaaaaaaaaa'), parse('x'.repeat(124) + 'abcde')]).toEqual([
      false,
      true,
      false,
      false,
    ])
  })
})

describe('the set-up of an empty database', () => {
  const setUp = (token: string, over: object = {}, now = NOW) =>
    acceptLink(
      systemCtx(db, now),
      acceptLinkSchema.parse({
        kind: 'setup',
        token,
        hospitalName: 'Invented Hospital',
        name: 'Avery First',
        email: 'avery@example.invalid',
        password: 'a long enough sentence',
        ...over,
      }),
    )
  const tokenOf = (url: string) => new URL(url).searchParams.get('token') ?? ''

  beforeEach(() => {
    db = openTestDatabase()
    serveDatabase(db)
  })

  it('creates the hospital and its first administrator, who has no role in any unit', async () => {
    const { url } = createSetupLink(systemCtx(db, NOW))
    expect(url).toMatch(/^http:\/\/daybreath\.test\/accept\?token=[\w-]{43}$/)
    await setUp(tokenOf(url))
    expect(db.select().from(hospitals).all()).toMatchObject([{ name: 'Invented Hospital', isDemo: false, idleLockMin: 15 }])
    const [person] = db.select().from(people).all()
    expect(person).toMatchObject({ name: 'Avery First', isAdministrator: true })
    expect(await isPasswordOf(db, person?.id ?? '', 'a long enough sentence')).toBe(true)
    expect(db.select().from(memberships).all()).toEqual([])
    expect(auditRows(db, 'setup.accept')).toHaveLength(1)
  })

  it('has one link at a time, for 24 hours', async () => {
    const first = tokenOf(createSetupLink(systemCtx(db, NOW)).url)
    const second = tokenOf(createSetupLink(systemCtx(db, NOW + 1)).url)
    await expect(setUp(first, {}, NOW + 2)).rejects.toMatchObject({ code: 'PRECONDITION' })
    await expect(setUp(second, {}, NOW + 1 + DAY_MS)).rejects.toMatchObject({ code: 'PRECONDITION' })
    await setUp(second, {}, NOW + DAY_MS)
    expect(db.select().from(hospitals).all()).toHaveLength(1)
  })

  it('is refused once a hospital exists, and to anybody but the program', async () => {
    const { url } = createSetupLink(systemCtx(db, NOW))
    const hospital = makeHospital(db)
    expect(codeOf(() => createSetupLink(systemCtx(db, NOW)))).toBe('PRECONDITION')
    await expect(setUp(tokenOf(url))).rejects.toMatchObject({ code: 'PRECONDITION' })
    expect(db.select().from(user).all()).toEqual([])
    const administrator = makePerson(db, hospital.id, [], { isAdministrator: true })
    expect(codeOf(() => createSetupLink(makeCtx(db, administrator)))).toBe('FORBIDDEN')
  })
})

describe('setting roles', () => {
  it('ends roles that are taken, begins new ones, leaves the rest, and says so in the audit log', () => {
    const unitId = world.medical.unit.id
    const wanted = [
      { unitId, role: 'nurse' as const },
      { unitId: world.surgical.unit.id, role: 'unit_lead' as const },
    ]
    setRoles(asAdministrator(), {
      personId: world.rt.id,
      version: 1,
      isAdministrator: false,
      memberships: [{ unitId, role: 'rt' }, ...wanted],
    })
    const person = setRoles(asAdministrator(NOW + 1), {
      personId: world.rt.id,
      version: 2,
      isAdministrator: false,
      memberships: wanted,
    })
    expect(person.memberships.map((held) => `${held.unitName} ${held.role}`)).toEqual([
      'Medical ICU nurse',
      'Surgical ICU unit_lead',
    ])
    const rows = db.select().from(memberships).where(eq(memberships.personId, world.rt.id)).all()
    expect(rows.map((row) => [row.role, row.endedAt]).sort()).toEqual([
      ['nurse', null],
      ['rt', NOW + 1],
      ['unit_lead', null],
    ])
    expect(auditRows(db, 'person.set_roles').at(-1)).toMatchObject({
      subjectId: world.rt.id,
      before: { memberships: expect.any(Array) },
    })
  })

  it('refuses a stale version and leaves everything as it was', () => {
    setRoles(asAdministrator(), { personId: world.rt.id, version: 1, isAdministrator: true, memberships: [] })
    const late = {
      personId: world.rt.id,
      version: 1,
      isAdministrator: false,
      memberships: [{ unitId: world.medical.unit.id, role: 'physician' as const }],
    }
    expect(codeOf(() => setRoles(asAdministrator(), late))).toBe('CONFLICT')
    expect(listPeople(asAdministrator()).people.find((one) => one.id === world.rt.id)).toMatchObject({
      isAdministrator: true,
      memberships: [],
    })
  })
})

describe('the last administrator', () => {
  it('cannot be taken away, by the administrator or by anybody else', () => {
    const { id } = world.administrator
    const memberships = [{ unitId: world.medical.unit.id, role: 'rt' as const }]
    expect(codeOf(() => deactivatePerson(asAdministrator(), { personId: id, version: 1 }))).toBe('PRECONDITION')
    expect(codeOf(() => setRoles(asAdministrator(), { personId: id, version: 1, isAdministrator: false, memberships }))).toBe(
      'PRECONDITION',
    )
    expect(listPeople(asAdministrator()).people.find((one) => one.id === id)).toMatchObject({
      isAdministrator: true,
      state: 'active',
    })
  })

  it('is not replaced by one who was only invited, who is deactivated, or who belongs to another hospital', () => {
    invitePerson(asAdministrator(), invitation({ isAdministrator: true }))
    const former = makePerson(db, world.hospital.id, [], { isAdministrator: true })
    givePassword(former)
    db.update(people).set({ deactivatedAt: NOW }).where(eq(people.id, former.id)).run()
    expect(codeOf(() => deactivatePerson(asAdministrator(), { personId: world.administrator.id, version: 1 }))).toBe(
      'PRECONDITION',
    )
  })

  it('may go once another one can sign in', () => {
    const second = makePerson(db, world.hospital.id, [], { isAdministrator: true })
    givePassword(second)
    expect(deactivatePerson(asAdministrator(), { personId: world.administrator.id, version: 1 }).state).toBe('deactivated')
    expect(codeOf(() => deactivatePerson(makeCtx(db, second), { personId: second.id, version: 1 }))).toBe('PRECONDITION')
  })
})

describe('deactivating and coming back', () => {
  it('ends sessions, roles and open links at once, with an audit row', () => {
    makeSession(db, world.nurse.id)
    makeSession(db, world.nurse.id)
    const kept = makeSession(db, world.rt.id)
    const person = deactivatePerson(asAdministrator(), { personId: world.nurse.id, version: 1 })
    expect(person).toMatchObject({ state: 'deactivated', memberships: [] })
    expect(
      db
        .select()
        .from(session)
        .all()
        .map((row) => row.id),
    ).toEqual([kept.sessionId])
    expect(
      db
        .select()
        .from(sessionStates)
        .all()
        .map((row) => row.sessionId),
    ).toEqual([kept.sessionId])
    expect(auditRows(db, 'person.deactivate').map((row) => row.after)).toMatchObject([{ sessionsEnded: 2, state: 'deactivated' }])
    expect(codeOf(() => deactivatePerson(asAdministrator(), { personId: world.nurse.id, version: 2 }))).toBe('PRECONDITION')
    expect(
      codeOf(() => setRoles(asAdministrator(), { personId: world.nurse.id, version: 2, isAdministrator: true, memberships: [] })),
    ).toBe('PRECONDITION')
  })

  it('brings a person back without the old password, roles or administration', () => {
    const second = makePerson(db, world.hospital.id, [{ unitId: world.medical.unit.id, role: 'physician' }], {
      isAdministrator: true,
    })
    givePassword(second)
    deactivatePerson(asAdministrator(), { personId: second.id, version: 1 })
    const person = reinvitePerson(asAdministrator(), { personId: second.id, version: 2 })
    expect(person).toMatchObject({ state: 'invited', isAdministrator: false, memberships: [] })
    expect(auditRows(db, 'person.reinvite')).toHaveLength(1)
  })

  it('does not send a new invitation to somebody who has a password', () => {
    givePassword(world.nurse)
    expect(codeOf(() => reinvitePerson(asAdministrator(), { personId: world.nurse.id, version: 1 }))).toBe('PRECONDITION')
    expect(db.select().from(mailLedger).all()).toEqual([])
  })
})
