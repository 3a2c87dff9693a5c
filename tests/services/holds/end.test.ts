import { describe, expect, it } from 'vitest'
import { holdEnds } from '@/db/schema'
import { endHoldSchema } from '@/lib/schemas/holds'
import { endHold } from '@/lib/services/holds/end'
import { observeHold } from '@/lib/services/holds/observe'
import { auditRows, makeCtx, makeWorld, NOW, TODAY } from '../../helpers/factories'
import { heldSince, holdEnd, holdLook, minute, NOTHING_SEEN } from '../../helpers/steps'
import { at, expectDoor, expectNothingLeft, expectOnce, expectRefusal } from '../../helpers/verb-checks'

type World = ReturnType<typeof makeWorld>
const rowsOf = (world: World) => world.db.select().from(holdEnds).all()
const look = (world: World, holdId: string, minutes: number, over: object, opensEyesToVoice: 'yes' | 'no' | null = null) =>
  observeHold(
    makeCtx(world.db, world.nurse),
    holdLook(world.episode.id, holdId, {
      observed: at(minute(minutes)),
      readings: { ...NOTHING_SEEN, ...over },
      opensEyesToVoice,
    }),
  )

describe('endHold', () => {
  it('is tolerated once the eyes opened to voice, restarts nothing, and writes the audit row', () => {
    const world = makeWorld()
    const { holdId } = heldSince(world)
    look(world, holdId, -30, { rass: -1 }, 'yes')
    const answer = endHold(makeCtx(world.db, world.nurse), holdEnd(world.episode.id, holdId))
    expect(rowsOf(world)).toMatchObject([
      { id: answer.id, holdId, outcome: 'tolerated', rulesMet: [], restarts: [], observedAt: minute(-20), recordedAt: NOW },
    ])
    expect(auditRows(world.db, 'hold.end')).toMatchObject([{ subjectId: answer.id }])
  })

  it('refuses a respiratory therapist and a person from another unit', () => {
    const world = makeWorld()
    const { holdId } = heldSince(world)
    expectDoor(world, endHold, holdEnd(world.episode.id, holdId, { note: 'calm' }), world.rt)
  })

  it('leaves nothing behind when the audit row cannot be written', () => {
    const world = makeWorld()
    const { holdId } = heldSince(world)
    expectNothingLeft(makeCtx(world.db, world.nurse), endHold, holdEnd(world.episode.id, holdId, { note: 'calm' }), 'hold.end')
  })

  it('records a request that arrives twice once', () => {
    const world = makeWorld()
    const { holdId } = heldSince(world)
    const given = holdEnd(world.episode.id, holdId, { note: 'calm' })
    expectOnce(world.db, world.nurse, endHold, given, { ...given, note: 'other' })
    expect(rowsOf(world)).toHaveLength(1)
  })

  // R-SAT1: propofol 30 mL/h stopped, f 38 for 7 min: fail, restart at 15 mL/h. R-SAT2: fentanyl for pain stays on (worked cases, Girard 2008).
  it('restarts the sedative at half its rate after f 38 for 7 min, and leaves analgesia for pain running', () => {
    const world = makeWorld()
    const { holdId } = heldSince(world)
    look(world, holdId, -40, { breathsPerMin: 38 })
    look(world, holdId, -33, { breathsPerMin: 38 })
    const answer = endHold(makeCtx(world.db, world.nurse), holdEnd(world.episode.id, holdId, { outcome: 'not_tolerated' }))
    expect(answer.restarts).toEqual([{ drug: 'propofol', unit: 'mL/h', rateBefore: 30, rate: 15 }])
    expect(rowsOf(world)[0]?.rulesMet).toHaveLength(1)
  })

  // R-SAT5: SpO2 87 % for 3 min is not a failure.
  it('does not fail on SpO2 87 % for 3 min: not tolerated then needs words', () => {
    const world = makeWorld()
    const { holdId } = heldSince(world)
    look(world, holdId, -40, { spo2Percent: 87 })
    look(world, holdId, -37, { spo2Percent: 87 })
    const given = holdEnd(world.episode.id, holdId, { outcome: 'not_tolerated' })
    expectRefusal(() => endHold(makeCtx(world.db, world.nurse), given), 'INVALID', 'rulesMet', /No limit is met so far/)
    endHold(makeCtx(world.db, world.nurse), { ...given, note: 'fought the tube' })
    expect(rowsOf(world)).toMatchObject([{ outcome: 'not_tolerated', rulesMet: [], restarts: [{ rate: 15 }] }])
  })

  // R-SAT3: 4 h 05 min calm, no eye opening: pass.
  it('is tolerated after 4 h 05 min without a limit met, and not after 3 h 59 min without words', () => {
    const world = makeWorld()
    const { holdId } = heldSince(world, minute(-245))
    look(world, holdId, -200, { breathsPerMin: 20 }, 'no')
    const early = holdEnd(world.episode.id, holdId, { observed: at(minute(-6)) })
    expectRefusal(() => endHold(makeCtx(world.db, world.nurse), early), 'INVALID', 'note', /Neither eyes open to voice nor 4 h/)
    endHold(makeCtx(world.db, world.nurse), holdEnd(world.episode.id, holdId, { observed: at(minute(0)) }))
    expect(rowsOf(world)).toMatchObject([{ outcome: 'tolerated' }])
  })

  it('asks for words when a limit was met and the hold is still called tolerated', () => {
    const world = makeWorld()
    const { holdId } = heldSince(world)
    look(world, holdId, -40, { breathsPerMin: 38 }, 'yes')
    look(world, holdId, -30, { breathsPerMin: 38 })
    const given = holdEnd(world.episode.id, holdId)
    expectRefusal(() => endHold(makeCtx(world.db, world.nurse), given), 'INVALID', 'note', /respiratory rate above 35/)
    endHold(makeCtx(world.db, world.nurse), { ...given, note: 'settled within a minute after suction' })
    expect(rowsOf(world)[0]?.rulesMet).toHaveLength(1)
  })

  it('takes a rule that the nurse names, and refuses one that the protocol does not have', () => {
    const world = makeWorld()
    const { holdId } = heldSince(world)
    const known = world.medical.protocolVersion.content.hold.failRules[0]?.id ?? ''
    const given = holdEnd(world.episode.id, holdId, { outcome: 'not_tolerated', rulesMet: ['unheard_of'] })
    expectRefusal(() => endHold(makeCtx(world.db, world.nurse), given), 'INVALID', 'rulesMet')
    endHold(makeCtx(world.db, world.nurse), { ...given, rulesMet: [known] })
    expect(rowsOf(world)[0]?.rulesMet).toEqual([known])
  })

  it('shows the second person the first one’s end', () => {
    const world = makeWorld()
    const { holdId } = heldSince(world)
    endHold(makeCtx(world.db, world.nurse), holdEnd(world.episode.id, holdId, { note: 'calm' }))
    const given = holdEnd(world.episode.id, holdId, { outcome: 'stopped', note: 'procedure' })
    expectRefusal(
      () => endHold(makeCtx(world.db, world.physician), given),
      'CONFLICT',
      undefined,
      /Noa Nurse recorded the end of this hold at 07:40: tolerated/,
    )
    expect(rowsOf(world)).toHaveLength(1)
  })

  it('refuses an end before the start and before the last look', () => {
    const world = makeWorld()
    const { holdId } = heldSince(world)
    look(world, holdId, -30, { rass: 0 }, 'yes')
    const end = (minutes: number) =>
      endHold(makeCtx(world.db, world.nurse), holdEnd(world.episode.id, holdId, { observed: at(minute(minutes)) }))
    expectRefusal(() => end(-60), 'INVALID', 'observed.time', /started at 07:10/)
    expectRefusal(() => end(-31), 'INVALID', 'observed.time', /observation stands at 07:30/)
    expect(end(-30).outcome).toBe('tolerated')
  })

  it('amends an end once, with a reason, and computes restarts anew', () => {
    const world = makeWorld()
    const ctx = makeCtx(world.db, world.nurse)
    const { holdId } = heldSince(world)
    const first = endHold(ctx, holdEnd(world.episode.id, holdId, { note: 'calm' }))
    const amend = holdEnd(world.episode.id, holdId, {
      outcome: 'not_tolerated',
      note: 'agitated after all',
      amends: { id: first.id, reason: 'wrong outcome' },
    })
    expect(endHold(ctx, amend).restarts).toMatchObject([{ rate: 15 }])
    expectRefusal(() => endHold(ctx, amend), 'CONFLICT')
    expect(rowsOf(world).map(({ entryVersion, outcome }) => [entryVersion, outcome])).toEqual([
      [1, 'tolerated'],
      [2, 'not_tolerated'],
    ])
  })

  it('asks why a hold was stopped', () => {
    const base = {
      episodeId: 'e',
      holdId: 'h',
      observed: { day: TODAY, time: '07:00' },
      amends: null,
      rulesMet: [],
      outcome: 'stopped',
    }
    expect(endHoldSchema.safeParse({ ...base, note: null }).error?.issues.map((issue) => issue.path.join('.'))).toEqual(['note'])
    expect(endHoldSchema.safeParse({ ...base, note: 'taken to theatre' }).success).toBe(true)
  })
})
