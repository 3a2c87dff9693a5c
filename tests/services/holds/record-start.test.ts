import { describe, expect, it } from 'vitest'
import { holds } from '@/db/schema'
import { startHoldSchema } from '@/lib/schemas/holds'
import { endHold } from '@/lib/services/holds/end'
import { observeHold } from '@/lib/services/holds/observe'
import { recordHoldStart } from '@/lib/services/holds/record-start'
import { auditRows, makeCtx, makePerson, makeWorld, NOW, TODAY } from '../../helpers/factories'
import { ALL_SAFE, FENTANYL_FOR_PAIN, heldSince, holdEnd, holdInput, holdLook, minute, PROPOFOL } from '../../helpers/steps'
import { at, expectDoor, expectNothingLeft, expectOnce, expectRefusal, refusalOf } from '../../helpers/verb-checks'

const rowsOf = (world: ReturnType<typeof makeWorld>) => world.db.select().from(holds).all()

describe('recordHoldStart', () => {
  it('keeps the safety answers and the infusions, and writes the audit row', () => {
    const world = makeWorld()
    const answer = heldSince(world)
    expect(rowsOf(world)).toMatchObject([
      {
        id: answer.id,
        entryId: answer.holdId,
        start: 'started',
        safety: ALL_SAFE,
        infusions: [PROPOFOL, FENTANYL_FOR_PAIN],
        ventilatorDay: TODAY,
        observedAt: minute(-50),
        recordedAt: NOW,
        recordedBy: world.nurse.id,
      },
    ])
    expect(auditRows(world.db, 'hold.start')).toMatchObject([{ subjectId: answer.id, actorId: world.nurse.id }])
  })

  it('refuses a respiratory therapist and a person from another unit', () => {
    const world = makeWorld()
    expectDoor(world, recordHoldStart, holdInput(world.episode.id), world.rt)
  })

  it('leaves nothing behind when the audit row cannot be written', () => {
    const world = makeWorld()
    expectNothingLeft(makeCtx(world.db, world.nurse), recordHoldStart, holdInput(world.episode.id), 'hold.start')
  })

  it('records a request that arrives twice once', () => {
    const world = makeWorld()
    expectOnce(
      world.db,
      world.nurse,
      recordHoldStart,
      holdInput(world.episode.id),
      holdInput(world.episode.id, { note: 'other' }),
    )
    expect(rowsOf(world)).toHaveLength(1)
  })

  it('does not start while a safety item is not answered, and names each one at its field', () => {
    const world = makeWorld()
    const { raised_icp: _icp, active_seizures: _seizures, ...answered } = ALL_SAFE
    const refusal = refusalOf(() =>
      recordHoldStart(makeCtx(world.db, world.nurse), holdInput(world.episode.id, { safety: answered })),
    )
    expect(refusal.code).toBe('INVALID')
    expect(Object.keys(refusal.fields ?? {}).sort()).toEqual(['safety.active_seizures', 'safety.raised_icp'])
    expectRefusal(() => recordHoldStart(makeCtx(world.db, world.nurse), holdInput(world.episode.id, { safety: null })), 'INVALID')
    expect(rowsOf(world)).toHaveLength(0)
  })

  it('records as unsafe with what makes it so, and as not needed without sedation', () => {
    const world = makeWorld()
    const ctx = makeCtx(world.db, world.nurse)
    const unsafe = recordHoldStart(
      ctx,
      holdInput(world.episode.id, { start: 'unsafe', safety: { neuromuscular_blockade: true } }),
    )
    const notNeeded = holdInput(world.episode.id, {
      start: 'not_needed',
      safety: null,
      infusions: [FENTANYL_FOR_PAIN],
      seenLatestId: unsafe.id,
    })
    recordHoldStart(ctx, notNeeded)
    expect(rowsOf(world).map(({ start }) => start)).toEqual(['unsafe', 'not_needed'])
  })

  it('refuses to start under 18', () => {
    const world = makeWorld()
    world.db.$client.prepare('update patients set birth_date = ?').run('2010-01-01')
    expectRefusal(
      () => recordHoldStart(makeCtx(world.db, world.nurse), holdInput(world.episode.id)),
      'PRECONDITION',
      undefined,
      /under 18/,
    )
  })
})

describe('one hold at a time', () => {
  it('refuses a second start by anyone while one runs, whatever the form showed', () => {
    const world = makeWorld()
    const first = heldSince(world)
    const second = makePerson(world.db, world.hospital.id, [{ unitId: world.medical.unit.id, role: 'nurse' }])
    const ctx = makeCtx(world.db, second)
    const words = /has been running since 07:10 \(Noa Nurse\)/
    for (const over of [{}, { seenLatestId: first.id }, { recordAnyway: true }]) {
      const input = holdInput(world.episode.id, { observed: at(minute(-5)), ...over })
      expectRefusal(() => recordHoldStart(ctx, input), 'PRECONDITION', undefined, words)
    }
    const notNeeded = holdInput(world.episode.id, {
      observed: at(minute(-5)),
      start: 'not_needed',
      safety: null,
      infusions: [],
      recordAnyway: true,
    })
    expectRefusal(() => recordHoldStart(ctx, notNeeded), 'PRECONDITION', undefined, words)
    expect(rowsOf(world)).toHaveLength(1)
  })

  it('refuses a late start that reaches into an ended hold, and takes one before it', () => {
    const world = makeWorld()
    const ctx = makeCtx(world.db, world.nurse)
    const { holdId, id } = heldSince(world)
    endHold(ctx, holdEnd(world.episode.id, holdId, { outcome: 'stopped', note: 'procedure' }))
    const start = (minutes: number) =>
      recordHoldStart(ctx, holdInput(world.episode.id, { observed: at(minute(minutes)), seenLatestId: id }))
    expectRefusal(() => start(-30), 'INVALID', 'observed.time', /from 07:10 to 07:40/)
    expectRefusal(() => start(-90), 'INVALID', 'observed.time', /two cannot overlap/)
    expect(start(-10).start).toBe('started')
  })

  it('tells who recorded one meanwhile when it is no longer running', () => {
    const world = makeWorld()
    recordHoldStart(
      makeCtx(world.db, world.nurse),
      holdInput(world.episode.id, { start: 'unsafe', safety: { raised_icp: true } }),
    )
    const input = holdInput(world.episode.id, { observed: at(minute(-5)) })
    expectRefusal(
      () => recordHoldStart(makeCtx(world.db, world.physician), input),
      'CONFLICT',
      undefined,
      /Noa Nurse recorded a sedation hold.*07:10: unsafe/,
    )
    expect(recordHoldStart(makeCtx(world.db, world.physician), { ...input, recordAnyway: true }).start).toBe('started')
  })
})

describe('amending the start of a hold', () => {
  it('keeps the hold’s id for its observations, and lets only one amendment of a version in', () => {
    const world = makeWorld()
    const ctx = makeCtx(world.db, world.nurse)
    const first = heldSince(world)
    const amend = {
      ...holdInput(world.episode.id, { infusions: [{ ...PROPOFOL, rate: 20 }] }),
      amends: { id: first.id, reason: 'pump read wrongly' },
    }
    const second = recordHoldStart(ctx, amend)
    expect(second).toMatchObject({ holdId: first.holdId })
    expect(second.id).not.toBe(first.id)
    expectRefusal(() => recordHoldStart(ctx, amend), 'CONFLICT')
    observeHold(ctx, holdLook(world.episode.id, first.holdId))
    expect(auditRows(world.db, 'hold.amend')).toHaveLength(1)
  })

  it('refuses to move the start past an observation, and to call a hold with observations not needed', () => {
    const world = makeWorld()
    const ctx = makeCtx(world.db, world.nurse)
    const { id, holdId } = heldSince(world)
    observeHold(ctx, holdLook(world.episode.id, holdId, { observed: at(minute(-40)) }))
    const amends = { id, reason: 'wrong time' }
    const moved = holdInput(world.episode.id, { observed: at(minute(-35)), amends })
    expectRefusal(() => recordHoldStart(ctx, moved), 'INVALID', 'observed.time', /observed at 07:20/)
    const undone = holdInput(world.episode.id, { start: 'not_needed', safety: null, infusions: [], amends })
    expectRefusal(() => recordHoldStart(ctx, undone), 'PRECONDITION', undefined, /so it did start/)
    expect(rowsOf(world)).toHaveLength(1)
  })
})

describe('startHoldSchema', () => {
  const base = {
    episodeId: 'e',
    observed: { day: TODAY, time: '07:00' },
    amends: null,
    seenLatestId: null,
    note: null,
    safety: ALL_SAFE,
  }
  const fieldsOf = (input: object) => {
    const parsed = startHoldSchema.safeParse({ ...base, ...input })
    return parsed.success ? [] : parsed.error.issues.map((issue) => issue.path.join('.'))
  }

  it.each([
    ['a start without sedation', { start: 'started', infusions: [FENTANYL_FOR_PAIN] }, ['infusions']],
    [
      'a start with a safety item present',
      { start: 'started', infusions: [PROPOFOL], safety: { ...ALL_SAFE, raised_icp: true } },
      ['safety.raised_icp'],
    ],
    ['unsafe without an item', { start: 'unsafe', infusions: [] }, ['safety']],
    ['not needed while a sedative runs', { start: 'not_needed', infusions: [PROPOFOL] }, ['infusions']],
    ['a rate of 0', { start: 'started', infusions: [{ ...PROPOFOL, rate: 0 }] }, ['infusions.0.rate']],
    ['a rate that is no number', { start: 'started', infusions: [{ ...PROPOFOL, rate: '30' }] }, ['infusions.0.rate']],
    ['an unknown unit', { start: 'started', infusions: [{ ...PROPOFOL, unit: 'drops' }] }, ['infusions.0.unit']],
    ['no choice', { infusions: [] }, ['start']],
  ])('refuses %s', (_title, input, fields) => {
    expect(fieldsOf(input)).toEqual(fields)
  })

  it('takes a start with sedation and analgesia for pain', () => {
    expect(fieldsOf({ start: 'started', infusions: [PROPOFOL, FENTANYL_FOR_PAIN] })).toEqual([])
  })
})
