import { describe, expect, it } from 'vitest'
import { protocolVersions } from '@/db/schema'
import type { ApproveProtocolInput, SaveDraftInput } from '@/lib/schemas/protocols'
import { approveProtocol } from '@/lib/services/protocols/approve'
import { readProtocol } from '@/lib/services/protocols/read'
import { saveDraft } from '@/lib/services/protocols/save-draft'
import { recordScreen } from '@/lib/services/screens/record'
import { defaultProtocol } from '@/lib/weaning/published/default-protocol'
import { auditRows, makeCtx, makePerson, makeWorld, NOW } from '../../helpers/factories'
import { minute, READY, screenInput, withFio2Limit } from '../../helpers/steps'
import { at, dumpRows, expectDoor, expectNothingLeft, expectOnce, expectRefusal } from '../../helpers/verb-checks'

type World = ReturnType<typeof makeWorld>
const draftInput = (world: World, over: Partial<SaveDraftInput> = {}): SaveDraftInput => ({
  unitId: world.medical.unit.id,
  version: null,
  content: withFio2Limit(0.4),
  note: 'FiO2 at most 0.40',
  ...over,
})
const approval = (
  world: World,
  draft: { id: string; version: number },
  over: Partial<ApproveProtocolInput> = {},
): ApproveProtocolInput => ({
  unitId: world.medical.unit.id,
  draftId: draft.id,
  version: draft.version,
  startDay: null,
  note: null,
  ...over,
})
const save = (world: World, over: Partial<SaveDraftInput> = {}) =>
  saveDraft(makeCtx(world.db, world.lead), draftInput(world, over))
const page = (world: World, person = world.lead, now = NOW) =>
  readProtocol(makeCtx(world.db, person, now), { unitId: world.medical.unit.id })
const rowOf = (world: World, id: string) =>
  world.db
    .select()
    .from(protocolVersions)
    .all()
    .find((row) => row.id === id)

describe('saveDraft', () => {
  it('saves a new draft under the next number, in force nowhere, and writes the audit row', () => {
    const world = makeWorld()
    const answer = save(world)
    expect(answer).toMatchObject({ number: 2, version: 1 })
    expect(rowOf(world, answer.id)).toMatchObject({
      unitId: world.medical.unit.id,
      isDefault: false,
      approvedAt: null,
      startsAt: null,
      draftedBy: world.lead.id,
      draftedAt: NOW,
      note: 'FiO2 at most 0.40',
    })
    expect(auditRows(world.db, 'protocol.draft')).toMatchObject([{ subjectId: answer.id, actorId: world.lead.id, before: null }])
    expect(page(world).current.number).toBe(1)
  })

  it('refuses a physician, and a unit lead of another unit', () => {
    const world = makeWorld()
    expectDoor(world, saveDraft, draftInput(world), world.physician)
    const elsewhere = makePerson(world.db, world.hospital.id, [{ unitId: world.surgical.unit.id, role: 'unit_lead' }])
    expectRefusal(() => saveDraft(makeCtx(world.db, elsewhere), draftInput(world)), 'NOT_FOUND')
  })

  it('leaves nothing behind when the audit row cannot be written', () => {
    const world = makeWorld()
    expectNothingLeft(makeCtx(world.db, world.lead), saveDraft, draftInput(world), 'protocol.draft')
  })

  it('saves a request that arrives twice once', () => {
    const world = makeWorld()
    expectOnce(world.db, world.lead, saveDraft, draftInput(world), draftInput(world, { note: 'Another note' }))
    expect(world.db.select().from(protocolVersions).all()).toHaveLength(3)
  })

  it('keeps one draft: a change raises its version, a stale one is refused and names who saved last', () => {
    const world = makeWorld()
    const first = save(world)
    const second = save(world, { version: 1, content: withFio2Limit(0.45) })
    expect(second).toEqual({ id: first.id, number: 2, version: 2 })
    for (const version of [1, null])
      expectRefusal(() => save(world, { version }), 'CONFLICT', undefined, /Lee Lead saved this draft/)
    expect(rowOf(world, first.id)?.content).toEqual(withFio2Limit(0.45))
    expect(auditRows(world.db, 'protocol.draft')[1]).toMatchObject({ before: { version: 1 }, after: { version: 2 } })
  })

  it('refuses to save over a draft that was approved meanwhile', () => {
    const world = makeWorld()
    const draft = save(world)
    approveProtocol(makeCtx(world.db, world.physician), approval(world, draft))
    expectRefusal(() => save(world, { version: 1 }), 'CONFLICT', undefined, /approved in the meantime/)
  })
})

describe('approveProtocol', () => {
  it('puts the draft in force from now on and writes the audit row', () => {
    const world = makeWorld()
    const draft = save(world)
    const answer = approveProtocol(
      makeCtx(world.db, world.physician),
      approval(world, draft, { note: 'agreed in the unit meeting' }),
    )
    expect(answer).toEqual({ id: draft.id, number: 2, startsAt: NOW })
    expect(rowOf(world, draft.id)).toMatchObject({
      approvedAt: NOW,
      approvedBy: world.physician.id,
      startsAt: NOW,
      note: 'FiO2 at most 0.40\nOn approval: agreed in the unit meeting',
    })
    expect(auditRows(world.db, 'protocol.approve')).toMatchObject([{ subjectId: draft.id, actorId: world.physician.id }])
    expect(page(world)).toMatchObject({
      current: { number: 2, approvedByName: 'Parker Physician' },
      draft: null,
      past: [{ number: 1, isDefault: true }],
    })
  })

  it('refuses a unit lead and a person from another unit', () => {
    const world = makeWorld()
    expectDoor(world, approveProtocol, approval(world, save(world)), world.lead)
  })

  it('leaves nothing behind when the audit row cannot be written', () => {
    const world = makeWorld()
    expectNothingLeft(makeCtx(world.db, world.physician), approveProtocol, approval(world, save(world)), 'protocol.approve')
  })

  it('approves a request that arrives twice once', () => {
    const world = makeWorld()
    const draft = save(world)
    expectOnce(world.db, world.physician, approveProtocol, approval(world, draft), approval(world, draft, { note: 'other' }))
  })

  it('starts on a stated later day at local midnight, and is not in force before', () => {
    const world = makeWorld()
    const draft = save(world)
    // 9 March 2026, 00:00 in Denver, the day after the clocks went forward: UTC-6.
    const { startsAt } = approveProtocol(makeCtx(world.db, world.physician), approval(world, draft, { startDay: '2026-03-09' }))
    expect(startsAt).toBe(Date.UTC(2026, 2, 9, 6, 0))
    expect(page(world)).toMatchObject({ current: { number: 1 }, upcoming: [{ number: 2 }], draft: null })
    expect(page(world, world.lead, startsAt - 1).current.number).toBe(1)
    expect(page(world, world.lead, startsAt)).toMatchObject({ current: { number: 2 }, upcoming: [], past: [{ number: 1 }] })
  })

  it.each([
    ['today', '2026-03-03', /after today/],
    ['a past day', '2026-03-01', /after today/],
    ['a day that does not exist', '2026-02-30', /does not exist/],
    ['a day more than a year away', '2027-03-04', /up to 3 Mar 2027/],
  ])('refuses %s as the start, at its field', (_title, startDay, words) => {
    const world = makeWorld()
    const draft = save(world)
    expectRefusal(
      () => approveProtocol(makeCtx(world.db, world.physician), approval(world, draft, { startDay })),
      'INVALID',
      'startDay',
      words,
    )
    expect(rowOf(world, draft.id)?.approvedAt).toBeNull()
  })

  it('refuses a physician who drafted any part of it, also when somebody else saved it last, and logs the refusal', () => {
    const world = makeWorld()
    const unitId = world.medical.unit.id
    const both = makePerson(world.db, world.hospital.id, [
      { unitId, role: 'physician' },
      { unitId, role: 'unit_lead' },
    ])
    const draft = saveDraft(makeCtx(world.db, both), draftInput(world))
    expectRefusal(
      () => approveProtocol(makeCtx(world.db, both), approval(world, draft)),
      'FORBIDDEN',
      undefined,
      /another physician/,
    )
    expect(page(world, both)).toMatchObject({
      may: { draft: true, approve: false },
      approveRefusal: expect.stringMatching(/another physician/) as unknown,
    })
    const later = save(world, { version: 1 })
    expectRefusal(() => approveProtocol(makeCtx(world.db, both), approval(world, later)), 'FORBIDDEN')
    expect(auditRows(world.db, 'access.denied').map((row) => row.actorId)).toEqual([both.id, both.id])
    expect(page(world, world.physician).may).toEqual({ draft: false, approve: true })
    expect(approveProtocol(makeCtx(world.db, world.physician), approval(world, later)).number).toBe(2)
  })

  it('refuses a draft that changed since it was read, an approved one, and one of another unit', () => {
    const world = makeWorld()
    const draft = save(world)
    save(world, { version: 1 })
    const ctx = makeCtx(world.db, world.physician)
    expectRefusal(() => approveProtocol(ctx, approval(world, draft)), 'CONFLICT', undefined, /changed since you read it/)
    approveProtocol(ctx, approval(world, { id: draft.id, version: 2 }))
    expectRefusal(
      () => approveProtocol(ctx, approval(world, { id: draft.id, version: 3 })),
      'CONFLICT',
      undefined,
      /was approved in the meantime/,
    )
    expectRefusal(() => approveProtocol(ctx, approval(world, { id: world.surgical.protocolVersion.id, version: 1 })), 'NOT_FOUND')
    expectRefusal(() => approveProtocol(ctx, approval(world, { id: world.medical.protocolVersion.id, version: 1 })), 'NOT_FOUND')
  })

  it('refuses a stored draft that no longer passes the checks', () => {
    const world = makeWorld()
    const draft = save(world, { content: withFio2Limit(0.9) })
    expectRefusal(
      () => approveProtocol(makeCtx(world.db, world.physician), approval(world, draft)),
      'PRECONDITION',
      undefined,
      /no longer passes/,
    )
  })

  it('never changes an approved version again: the database itself refuses', () => {
    const world = makeWorld()
    const draft = save(world)
    approveProtocol(makeCtx(world.db, world.physician), approval(world, draft))
    const change = world.db.$client.prepare('update protocol_versions set note = ? where id = ?')
    expect(() => change.run('other', draft.id)).toThrow(/fixed/)
  })

  it('judges a screen of before by the version of before, and one of after by the new one', () => {
    const world = makeWorld()
    const readings = { ...READY, fio2Fraction: 0.5 }
    const first = recordScreen(makeCtx(world.db, world.rt), screenInput(world.episode.id, { readings }))
    const kept = dumpRows(world.db)['screens']
    approveProtocol(makeCtx(world.db, world.physician), approval(world, save(world)))
    expect(dumpRows(world.db)['screens']).toEqual(kept)
    const later = screenInput(world.episode.id, { readings, observed: at(minute(10)), seenLatestId: first.id })
    expect(recordScreen(makeCtx(world.db, world.rt, minute(12)), later).result).toBe('not_ready')
    expect(first.result).toBe('ready')
  })
})

describe('readProtocol', () => {
  it('describes the rules in words with their sources, for every clinical role', () => {
    const world = makeWorld()
    const { current } = page(world, world.nurse)
    expect(current.content).toEqual(defaultProtocol)
    expect(current.described.criteria[0]).toMatchObject({ label: 'FiO2', limit: '0.50 or less' })
    expect(current.described.criteria[1]).toMatchObject({ label: 'PEEP', limit: '8 or less cmH2O' })
    expect(current.described.stopRules.map(({ words }) => words)).toContain('respiratory rate above 35 /min for 5 min')
    expect(current.described.failRules.every(({ source }) => source.length > 3)).toBe(true)
    expect(page(world, world.nurse)).toMatchObject({
      may: { draft: false, approve: false },
      approveRefusal: null,
      upcoming: [],
      past: [],
      draft: null,
    })
  })

  it('refuses a person from another unit and an administrator', () => {
    const world = makeWorld()
    expectDoor(world, readProtocol, { unitId: world.medical.unit.id }, null)
    expectRefusal(() => page(world, world.administrator), 'NOT_FOUND')
  })
})
