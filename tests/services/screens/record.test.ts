import { describe, expect, it } from 'vitest'
import { screens } from '@/db/schema'
import { recordScreenSchema } from '@/lib/schemas/screens'
import { recordScreen } from '@/lib/services/screens/record'
import { localDay } from '@/lib/shared/time'
import { auditRows, makeAdmitted, makeCtx, makeUnit, makePerson, makeWorld, NOW, TODAY } from '../../helpers/factories'
import { addVersion, minute, NOT_ASSESSED, READY, screened, screenInput, withFio2Limit } from '../../helpers/steps'
import { at, expectDoor, expectNothingLeft, expectOnce, expectRefusal, refusalOf } from '../../helpers/verb-checks'

const rowsOf = (world: ReturnType<typeof makeWorld>) => world.db.select().from(screens).all()

describe('recordScreen', () => {
  it('keeps readings, verdict, both times, author, day and protocol version, and writes the audit row', () => {
    const world = makeWorld()
    const answer = recordScreen(makeCtx(world.db, world.rt), screenInput(world.episode.id))
    const [row] = rowsOf(world)
    expect(row).toMatchObject({
      id: answer.id,
      entryVersion: 1,
      result: 'ready',
      excuse: null,
      readings: READY,
      ventilatorDay: TODAY,
      observedAt: minute(-60),
      recordedAt: NOW,
      recordedBy: world.rt.id,
      protocolVersionId: world.medical.protocolVersion.id,
    })
    expect(row?.verdict?.criteria.map(({ criterion, mark }) => [criterion, mark])).toEqual([
      ['fio2', 'met'],
      ['peep', 'met'],
      ['norepinephrine', 'met'],
      ['otherVasopressor', 'met'],
      ['ischaemia', 'met'],
    ])
    expect(answer.result).toBe('ready')
    expect(auditRows(world.db, 'screen.record')).toMatchObject([
      { subjectId: answer.id, unitId: world.medical.unit.id, actorId: world.rt.id },
    ])
  })

  it.each([
    ['not ready at PEEP 8.5', { peepCmH2O: 8.5 }, 'not_ready'],
    ['ready at PEEP exactly 8', { peepCmH2O: 8 }, 'ready'],
    ['not ready at FiO2 0.51', { fio2Fraction: 0.51 }, 'not_ready'],
    ['ready at FiO2 exactly 0.50', { fio2Fraction: 0.5 }, 'ready'],
    ['incomplete when ischaemia is not assessed', { ischaemia: null }, 'incomplete'],
    [
      'not ready rather than incomplete when one is not met and another not assessed',
      { ischaemia: null, peepCmH2O: 12 },
      'not_ready',
    ],
  ] as const)('answers %s', (_title, over, result) => {
    const world = makeWorld()
    const input = screenInput(world.episode.id, { readings: { ...READY, ...over } })
    expect(recordScreen(makeCtx(world.db, world.rt), input).result).toBe(result)
  })

  it('refuses a nurse and a person from another unit', () => {
    const world = makeWorld()
    expectDoor(world, recordScreen, screenInput(world.episode.id), world.nurse)
  })

  it('leaves nothing behind when the audit row cannot be written', () => {
    const world = makeWorld()
    expectNothingLeft(makeCtx(world.db, world.rt), recordScreen, screenInput(world.episode.id), 'screen.record')
  })

  it('records a request that arrives twice once', () => {
    const world = makeWorld()
    const other = screenInput(world.episode.id, { readings: { ...READY, peepCmH2O: 7 } })
    expectOnce(world.db, world.rt, recordScreen, screenInput(world.episode.id), other)
    expect(rowsOf(world)).toHaveLength(1)
  })

  it('excuses a patient with a reason and no verdict', () => {
    const world = makeWorld()
    const input = screenInput(world.episode.id, { excuse: 'prone', readings: null })
    expect(recordScreen(makeCtx(world.db, world.rt), input).result).toBe('excused')
    expect(rowsOf(world)).toMatchObject([{ result: 'excused', excuse: 'prone', verdict: null, readings: null }])
  })

  it('judges by the age on the day of the screen: refuses under 18 and an unknown birth date, and still excuses', () => {
    const world = makeWorld()
    const ctx = makeCtx(world.db, world.rt)
    const setBirth = (day: string | null) => world.db.$client.prepare('update patients set birth_date = ?').run(day)
    setBirth('2008-03-04')
    expectRefusal(() => recordScreen(ctx, screenInput(world.episode.id)), 'PRECONDITION', undefined, /under 18/)
    setBirth(null)
    expectRefusal(() => recordScreen(ctx, screenInput(world.episode.id)), 'PRECONDITION', undefined, /birth date is not known/)
    expect(rowsOf(world)).toHaveLength(0)
    expect(recordScreen(ctx, screenInput(world.episode.id, { excuse: 'ecmo', readings: null })).result).toBe('excused')
    setBirth('2008-03-03')
    expect(recordScreen(ctx, screenInput(world.episode.id, { recordAnyway: true })).result).toBe('ready')
  })
})

describe('two people at the screen', () => {
  it('shows the second one who recorded when and with what result, records nothing, and lets the second one in on request', () => {
    const world = makeWorld()
    const first = screened(world)
    const input = screenInput(world.episode.id, { observed: at(minute(-30)), readings: { ...READY, peepCmH2O: 10 } })
    const refusal = refusalOf(() => recordScreen(makeCtx(world.db, world.physician), input))
    expect(refusal.code).toBe('CONFLICT')
    expect(refusal.message).toContain('Robin Therapist recorded a screen in the meantime, at 07:00: ready')
    expect(refusal.fields).toBeUndefined()
    expect(rowsOf(world)).toHaveLength(1)
    recordScreen(makeCtx(world.db, world.physician), { ...input, recordAnyway: true })
    expect(rowsOf(world)).toHaveLength(2)
    expect(rowsOf(world)[0]?.id).toBe(first.id)
  })

  it('lets a second screen of the day in when the form showed the first', () => {
    const world = makeWorld()
    const first = screened(world)
    recordScreen(makeCtx(world.db, world.rt), screenInput(world.episode.id, { observed: at(minute(-5)), seenLatestId: first.id }))
    expect(rowsOf(world)).toHaveLength(2)
  })
})

describe('amending a screen', () => {
  it('is judged by the protocol version of the original, also after the protocol changed', () => {
    const world = makeWorld()
    const first = recordScreen(
      makeCtx(world.db, world.rt),
      screenInput(world.episode.id, { readings: { ...READY, fio2Fraction: 0.45 } }),
    )
    const before = rowsOf(world)[0]
    const stricter = addVersion(world.db, world, withFio2Limit(0.4), minute(-10))
    const later = makeCtx(world.db, world.rt, minute(20))
    const amended = recordScreen(
      later,
      screenInput(world.episode.id, {
        observed: at(minute(5)),
        readings: { ...READY, fio2Fraction: 0.5 },
        amends: { id: first.id, reason: 'read the wrong monitor' },
      }),
    )
    expect(amended.result).toBe('ready')
    const rows = rowsOf(world)
    expect(rows[0]).toEqual(before)
    expect(rows[1]).toMatchObject({
      entryId: first.id,
      entryVersion: 2,
      supersedesId: first.id,
      amendReason: 'read the wrong monitor',
      protocolVersionId: world.medical.protocolVersion.id,
    })
    const fresh = screenInput(world.episode.id, {
      observed: at(minute(10)),
      readings: { ...READY, fio2Fraction: 0.5 },
      seenLatestId: amended.id,
    })
    expect(recordScreen(later, fresh).result).toBe('not_ready')
    expect(rowsOf(world)[2]?.protocolVersionId).toBe(stricter.id)
    expect(auditRows(world.db, 'screen.amend')).toHaveLength(1)
  })

  it('judges a late entry by the protocol that was in force when it was observed', () => {
    const world = makeWorld()
    addVersion(world.db, world, withFio2Limit(0.4), minute(-10))
    const late = screenInput(world.episode.id, { observed: at(minute(-60)), readings: { ...READY, fio2Fraction: 0.5 } })
    expect(recordScreen(makeCtx(world.db, world.rt), late).result).toBe('ready')
    expect(rowsOf(world)).toMatchObject([
      { protocolVersionId: world.medical.protocolVersion.id, recordedAt: NOW, observedAt: minute(-60) },
    ])
  })

  it('lets only the first of two amendments of one version in', () => {
    const world = makeWorld()
    const { id } = screened(world)
    const amend = (reason: string) =>
      screenInput(world.episode.id, { amends: { id, reason }, readings: { ...READY, peepCmH2O: 7 } })
    recordScreen(makeCtx(world.db, world.rt), amend('typed wrongly'))
    expectRefusal(
      () => recordScreen(makeCtx(world.db, world.physician), amend('also wrong')),
      'CONFLICT',
      undefined,
      /in the meantime/,
    )
    expect(rowsOf(world)).toHaveLength(2)
  })

  it('refuses another therapist, and a version of another episode', () => {
    const world = makeWorld()
    const { id } = screened(world)
    const other = makePerson(world.db, world.hospital.id, [{ unitId: world.medical.unit.id, role: 'rt' }])
    const input = screenInput(world.episode.id, { amends: { id, reason: 'typed wrongly' } })
    expectRefusal(() => recordScreen(makeCtx(world.db, other), input), 'FORBIDDEN')
    const bed = world.medical.beds[1]
    if (!bed) throw new Error('The unit has one bed only.')
    const second = makeAdmitted(world.db, {
      unit: world.medical.unit,
      bed,
      protocolVersionId: world.medical.protocolVersion.id,
      by: world.rt.id,
    })
    expectRefusal(() => recordScreen(makeCtx(world.db, world.rt), { ...input, episodeId: second.episode.id }), 'NOT_FOUND')
  })
})

describe('the hour that the clocks double', () => {
  it('asks which of the two, and keeps the one that is meant on its own day', () => {
    const world = makeWorld()
    const now = Date.UTC(2026, 10, 1, 15, 0)
    world.db.$client.prepare('update episodes set started_at = ?').run(now - 48 * 3_600_000)
    world.db.$client.prepare('update stays set started_at = ?').run(now - 60 * 3_600_000)
    const ctx = makeCtx(world.db, world.rt, now)
    const observed = { day: '2026-11-01', time: '01:30' }
    expectRefusal(
      () => recordScreen(ctx, screenInput(world.episode.id, { observed })),
      'INVALID',
      'observed.fold',
      /first or the second/,
    )
    recordScreen(ctx, screenInput(world.episode.id, { observed: { ...observed, fold: 'second' } }))
    recordScreen(ctx, screenInput(world.episode.id, { observed: { ...observed, fold: 'first' }, recordAnyway: true }))
    expect(rowsOf(world).map((row) => row.observedAt)).toEqual([Date.UTC(2026, 10, 1, 8, 30), Date.UTC(2026, 10, 1, 7, 30)])
    expect(rowsOf(world).map((row) => row.ventilatorDay)).toEqual(['2026-11-01', '2026-11-01'])
  })

  it('refuses the hour that the clocks skip', () => {
    const world = makeWorld()
    const now = Date.UTC(2026, 2, 8, 15, 0)
    const input = screenInput(world.episode.id, { observed: { day: '2026-03-08', time: '02:30' } })
    expectRefusal(() => recordScreen(makeCtx(world.db, world.rt, now), input), 'INVALID', 'observed.time', /did not exist/)
  })

  it('puts a screen on the calendar day of the unit that the patient was in, whatever its time zone', () => {
    const world = makeWorld()
    const tokyo = makeUnit(world.db, world.hospital.id, { timeZone: 'Asia/Tokyo', bedPrefix: 'T' })
    const bed = tokyo.beds[0]
    if (!bed) throw new Error('The unit has no bed.')
    const rt = makePerson(world.db, world.hospital.id, [{ unitId: tokyo.unit.id, role: 'rt' }])
    const there = makeAdmitted(world.db, { unit: tokyo.unit, bed, protocolVersionId: tokyo.protocolVersion.id, by: rt.id })
    recordScreen(makeCtx(world.db, rt), screenInput(there.episode.id, { observed: at(NOW, 'Asia/Tokyo') }))
    expect(rowsOf(world)[0]?.ventilatorDay).toBe(localDay(NOW, 'Asia/Tokyo'))
    expect(rowsOf(world)[0]?.ventilatorDay).toBe('2026-03-04')
  })
})

describe('recordScreenSchema', () => {
  const base = {
    episodeId: 'e',
    observed: { day: '2026-03-03', time: '07:00' },
    amends: null,
    seenLatestId: null,
    excuse: null,
    note: null,
  }
  const fieldsOf = (input: object) => {
    const parsed = recordScreenSchema.safeParse(input)
    return parsed.success ? {} : Object.fromEntries(parsed.error.issues.map((issue) => [issue.path.join('.'), issue.message]))
  }

  it('asks for at least one reading or an excuse', () => {
    expect(Object.keys(fieldsOf({ ...base, readings: null }))).toEqual(['readings'])
    expect(Object.keys(fieldsOf({ ...base, readings: NOT_ASSESSED }))).toEqual(['readings'])
    expect(Object.keys(fieldsOf({ ...base, readings: { ...NOT_ASSESSED, rsbiCondition: 'cpap' } }))).toEqual(['readings'])
    expect(fieldsOf({ ...base, readings: { ...NOT_ASSESSED, otherVasopressor: false } })).toEqual({})
  })

  it('asks for words when the excuse is another reason', () => {
    expect(Object.keys(fieldsOf({ ...base, readings: null, excuse: 'other' }))).toEqual(['note'])
    expect(fieldsOf({ ...base, readings: null, excuse: 'other', note: 'dialysis catheter change' })).toEqual({})
  })

  it('asks how rate and volume were measured', () => {
    const readings = { ...READY, breathsPerMin: 24, tidalVolumeMl: 350 }
    expect(Object.keys(fieldsOf({ ...base, readings }))).toEqual(['readings.rsbiCondition'])
    expect(fieldsOf({ ...base, readings: { ...readings, rsbiCondition: 'cpap' } })).toEqual({})
  })

  it('takes FiO2 50 for a slip, and an unusual rate only after a second look', () => {
    expect(fieldsOf({ ...base, readings: { ...READY, fio2Fraction: 50 } })['readings.fio2Fraction']).toMatch(/0\.50\?/)
    const unusual = { ...base, readings: { ...READY, breathsPerMin: 55 } }
    expect(fieldsOf(unusual)['readings.breathsPerMin']).toMatch(/Look again/)
    expect(fieldsOf({ ...unusual, confirmedUnlikely: ['readings.breathsPerMin'] })).toEqual({})
  })
})
