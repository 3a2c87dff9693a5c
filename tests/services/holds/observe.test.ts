import { describe, expect, it } from 'vitest'
import { holdObservations } from '@/db/schema'
import { observeHoldSchema } from '@/lib/schemas/holds'
import { endHold } from '@/lib/services/holds/end'
import { observeHold } from '@/lib/services/holds/observe'
import { recordHoldStart } from '@/lib/services/holds/record-start'
import { defaultProtocol } from '@/lib/weaning/published/default-protocol'
import { auditRows, makeCtx, makeWorld, NOW } from '../../helpers/factories'
import { addVersion, CALM, heldSince, holdEnd, holdInput, holdLook, minute, NOTHING_SEEN } from '../../helpers/steps'
import { at, expectDoor, expectNothingLeft, expectOnce, expectRefusal } from '../../helpers/verb-checks'

describe('observeHold', () => {
  it('keeps the readings under the hold and writes the audit row; a therapist may add one', () => {
    const world = makeWorld()
    const { holdId } = heldSince(world)
    const answer = observeHold(makeCtx(world.db, world.rt), holdLook(world.episode.id, holdId, { opensEyesToVoice: 'yes' }))
    expect(world.db.select().from(holdObservations).all()).toMatchObject([
      {
        id: answer.id,
        holdId,
        readings: CALM,
        opensEyesToVoice: 'yes',
        observedAt: minute(-40),
        recordedAt: NOW,
        recordedBy: world.rt.id,
      },
    ])
    expect(answer.rulesMet).toEqual([])
    expect(auditRows(world.db, 'hold.observe')).toMatchObject([{ subjectId: answer.id }])
  })

  it('refuses a unit lead and a person from another unit', () => {
    const world = makeWorld()
    const { holdId } = heldSince(world)
    expectDoor(world, observeHold, holdLook(world.episode.id, holdId), world.lead)
  })

  it('leaves nothing behind when the audit row cannot be written', () => {
    const world = makeWorld()
    const { holdId } = heldSince(world)
    expectNothingLeft(makeCtx(world.db, world.nurse), observeHold, holdLook(world.episode.id, holdId), 'hold.observe')
  })

  it('records a request that arrives twice once', () => {
    const world = makeWorld()
    const { holdId } = heldSince(world)
    const other = holdLook(world.episode.id, holdId, { opensEyesToVoice: 'no' })
    expectOnce(world.db, world.nurse, observeHold, holdLook(world.episode.id, holdId), other)
    expect(world.db.select().from(holdObservations).all()).toHaveLength(1)
  })

  it('meets the limit of 35 breaths for 5 min only when two looks span 5 min', () => {
    const world = makeWorld()
    const { holdId } = heldSince(world)
    const look = (minutes: number, breathsPerMin: number) =>
      observeHold(
        makeCtx(world.db, world.nurse),
        holdLook(world.episode.id, holdId, {
          observed: at(minute(minutes)),
          readings: { ...NOTHING_SEEN, breathsPerMin },
        }),
      ).rulesMet
    expect(look(-40, 38)).toEqual([])
    expect(look(-36, 38)).toEqual([])
    expect(look(-35, 35)).toEqual([])
    expect(look(-30, 36)).toEqual([])
    expect(look(-25, 36)).toHaveLength(1)
  })

  it('is judged by the protocol version that the hold began under', () => {
    const world = makeWorld()
    const { holdId } = heldSince(world)
    const lax = { ...defaultProtocol, hold: { ...defaultProtocol.hold, failRules: [] } }
    addVersion(world.db, world, lax, minute(-45))
    const look = (minutes: number) =>
      observeHold(
        makeCtx(world.db, world.nurse),
        holdLook(world.episode.id, holdId, {
          observed: at(minute(minutes)),
          readings: { ...NOTHING_SEEN, breathsPerMin: 38 },
        }),
      )
    look(-40)
    expect(look(-30).rulesMet).toHaveLength(1)
    expect(
      world.db
        .select()
        .from(holdObservations)
        .all()
        .map((row) => row.protocolVersionId),
    ).toEqual([world.medical.protocolVersion.id, world.medical.protocolVersion.id])
  })

  it('refuses a time before the hold and after its end, and takes a late one in between', () => {
    const world = makeWorld()
    const ctx = makeCtx(world.db, world.nurse)
    const { holdId } = heldSince(world)
    const look = (minutes: number) => observeHold(ctx, holdLook(world.episode.id, holdId, { observed: at(minute(minutes)) }))
    expectRefusal(() => look(-51), 'INVALID', 'observed.time', /started at 07:10/)
    endHold(ctx, holdEnd(world.episode.id, holdId, { outcome: 'stopped', note: 'procedure' }))
    expectRefusal(() => look(-19), 'INVALID', 'observed.time', /ended at 07:40/)
    expect(look(-21).rulesMet).toEqual([])
  })

  it('finds no hold that was not started, and none of another episode', () => {
    const world = makeWorld()
    const { holdId } = recordHoldStart(
      makeCtx(world.db, world.nurse),
      holdInput(world.episode.id, { start: 'unsafe', safety: { raised_icp: true } }),
    )
    expectRefusal(() => observeHold(makeCtx(world.db, world.nurse), holdLook(world.episode.id, holdId)), 'NOT_FOUND')
    expectRefusal(() => observeHold(makeCtx(world.db, world.nurse), holdLook(world.episode.id, 'absent')), 'NOT_FOUND')
  })

  it('amends a look once; the limit that it met is no longer met', () => {
    const world = makeWorld()
    const ctx = makeCtx(world.db, world.nurse)
    const { holdId } = heldSince(world)
    const high = { ...NOTHING_SEEN, breathsPerMin: 38 }
    observeHold(ctx, holdLook(world.episode.id, holdId, { observed: at(minute(-40)), readings: high }))
    const second = observeHold(ctx, holdLook(world.episode.id, holdId, { observed: at(minute(-30)), readings: high }))
    expect(second.rulesMet).toHaveLength(1)
    const amend = holdLook(world.episode.id, holdId, {
      observed: at(minute(-30)),
      readings: { ...NOTHING_SEEN, breathsPerMin: 28 },
      amends: { id: second.id, reason: 'typed wrongly' },
    })
    expect(observeHold(ctx, amend).rulesMet).toEqual([])
    expectRefusal(() => observeHold(ctx, amend), 'CONFLICT')
  })
})

describe('observeHoldSchema', () => {
  const base = { episodeId: 'e', holdId: 'h', observed: { day: '2026-03-03', time: '07:00' }, amends: null }
  it('asks for a reading, a sign or an answer', () => {
    const isValid = (over: object) =>
      observeHoldSchema.safeParse({ ...base, readings: NOTHING_SEEN, opensEyesToVoice: null, ...over }).success
    expect(isValid({})).toBe(false)
    expect(isValid({ opensEyesToVoice: 'no' })).toBe(true)
    expect(isValid({ readings: { ...NOTHING_SEEN, signs: ['agitation'] } })).toBe(true)
    expect(isValid({ readings: { ...NOTHING_SEEN, rass: -2 } })).toBe(true)
    expect(isValid({ readings: { ...NOTHING_SEEN, rass: -2.5 } })).toBe(false)
  })

  it('asks whether swapped blood pressures are right', () => {
    const parsed = observeHoldSchema.safeParse({
      ...base,
      readings: { ...CALM, systolicMmHg: 70, diastolicMmHg: 130 },
      opensEyesToVoice: null,
    })
    expect(parsed.error?.issues.map((issue) => issue.path.join('.'))).toContain('readings.diastolicMmHg')
  })
})
