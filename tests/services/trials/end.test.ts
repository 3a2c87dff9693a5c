import { describe, expect, it } from 'vitest'
import { trialEnds, trialObservations } from '@/db/schema'
import { endTrialSchema } from '@/lib/schemas/trials'
import { endTrial } from '@/lib/services/trials/end'
import { observeTrial } from '@/lib/services/trials/observe'
import { readNextMove } from '@/lib/services/today/read-next-move'
import { auditRows, makeCtx, makeWorld, NOW } from '../../helpers/factories'
import { CALM, minute, NOTHING_SEEN, onTrial, trialEnd, trialLook } from '../../helpers/steps'
import { at, expectDoor, expectNothingLeft, expectOnce, expectRefusal } from '../../helpers/verb-checks'

type World = ReturnType<typeof makeWorld>
const rowsOf = (world: World) => world.db.select().from(trialEnds).all()
const look = (world: World, trialId: string, minutes: number, over: object = {}) =>
  observeTrial(
    makeCtx(world.db, world.rt),
    trialLook(world.episode.id, trialId, { observed: at(minute(minutes)), readings: { ...CALM, ...over } }),
  )
const end = (world: World, trialId: string, over: Parameters<typeof trialEnd>[2] = {}) =>
  endTrial(makeCtx(world.db, world.rt), trialEnd(world.episode.id, trialId, over))

describe('endTrial', () => {
  it('passes at the planned end after looks without a stop rule met; the decision is the physician’s next move', () => {
    const world = makeWorld()
    const { trialId } = onTrial(world)
    look(world, trialId, -12)
    const answer = end(world, trialId)
    expect(rowsOf(world)).toMatchObject([
      { id: answer.id, trialId, outcome: 'passed', rulesMet: [], observedAt: minute(-10), recordedAt: NOW },
    ])
    expect(auditRows(world.db, 'trial.end')).toMatchObject([{ subjectId: answer.id }])
    const move = readNextMove(world.db, { episode: world.episode, patient: world.patient, unit: world.medical.unit }, NOW)
    expect(move).toMatchObject({ kind: 'move', step: 'decide', role: 'physician', sinceMs: minute(-10) })
  })

  it('refuses a nurse and a person from another unit', () => {
    const world = makeWorld()
    const { trialId } = onTrial(world)
    expectDoor(world, endTrial, trialEnd(world.episode.id, trialId, { reason: 'well' }), world.nurse)
  })

  it('leaves nothing behind when the audit row cannot be written, not even the signs', () => {
    const world = makeWorld()
    const { trialId } = onTrial(world)
    const input = trialEnd(world.episode.id, trialId, {
      outcome: 'failed',
      signs: ['sweating', 'marked_dyspnoea'],
      returnedTo: 'PC-IMV',
    })
    expectNothingLeft(makeCtx(world.db, world.rt), endTrial, input, 'trial.end')
  })

  it('records a request that arrives twice once', () => {
    const world = makeWorld()
    const { trialId } = onTrial(world)
    const input = trialEnd(world.episode.id, trialId, { reason: 'well' })
    expectOnce(world.db, world.rt, endTrial, input, { ...input, reason: 'other' })
    expect(rowsOf(world)).toHaveLength(1)
  })

  it('asks for a reason to pass before the planned end, and takes the planned minute itself', () => {
    const world = makeWorld()
    const { trialId } = onTrial(world)
    look(world, trialId, -20)
    const early = { observed: at(minute(-11)) }
    expectRefusal(() => end(world, trialId, early), 'INVALID', 'reason', /planned end is 07:50/)
    expect(end(world, trialId, { observed: at(minute(-10)) }).outcome).toBe('passed')
  })

  it('asks for a reason to pass while a stop rule is met, and names the rule', () => {
    const world = makeWorld()
    const { trialId } = onTrial(world)
    look(world, trialId, -30, { systolicMmHg: 85, diastolicMmHg: 50 })
    look(world, trialId, -12)
    expectRefusal(() => end(world, trialId), 'INVALID', 'reason', /systolic blood pressure below 90 mmHg/)
    end(world, trialId, { reason: 'cuff slipped, repeated at once' })
    expect(rowsOf(world)).toMatchObject([
      { outcome: 'passed', rulesMet: ['systolic_low'], reason: 'cuff slipped, repeated at once' },
    ])
  })

  it('asks for a reason to pass when nobody looked', () => {
    const world = makeWorld()
    const { trialId } = onTrial(world)
    expectRefusal(() => end(world, trialId), 'INVALID', 'reason', /No look/)
    observeTrial(makeCtx(world.db, world.nurse), trialLook(world.episode.id, trialId, { readings: { ...NOTHING_SEEN, rass: 0 } }))
    expectRefusal(() => end(world, trialId), 'INVALID', 'reason', /No look/)
  })

  it('fails with the rules that the looks meet', () => {
    const world = makeWorld()
    const { trialId } = onTrial(world)
    look(world, trialId, -30, { breathsPerMin: 38 })
    look(world, trialId, -25, { breathsPerMin: 40 })
    end(world, trialId, { outcome: 'failed', observed: at(minute(-24)), returnedTo: 'PC-IMV as before' })
    expect(rowsOf(world)[0]).toMatchObject({ outcome: 'failed', returnedTo: 'PC-IMV as before' })
    expect(rowsOf(world)[0]?.rulesMet).toHaveLength(1)
  })

  // R-S8 by the ABC list: two distress signs fail, R-S9: one does not (Girard 2008, from memory).
  it('keeps signs given with the end as a last look: two meet the rule, one needs words', () => {
    const world = makeWorld()
    const { trialId } = onTrial(world)
    const failed = { outcome: 'failed', returnedTo: 'PC-IMV' } as const
    expectRefusal(() => end(world, trialId, { ...failed, signs: ['sweating'] }), 'INVALID', 'rulesMet', /No stop rule is met/)
    expect(world.db.select().from(trialObservations).all()).toEqual([])
    end(world, trialId, { ...failed, signs: ['sweating', 'marked_dyspnoea'] })
    expect(rowsOf(world)[0]?.rulesMet).toHaveLength(1)
    expect(world.db.select().from(trialObservations).all()).toMatchObject([
      {
        trialId,
        observedAt: minute(-10),
        readings: { ...NOTHING_SEEN, signs: ['sweating', 'marked_dyspnoea'] },
        recordedBy: world.rt.id,
      },
    ])
    expect(auditRows(world.db, 'trial.observe')).toHaveLength(1)
  })

  it('takes a rule that the therapist names, and refuses one that the protocol does not have', () => {
    const world = makeWorld()
    const { trialId } = onTrial(world)
    const failed = { outcome: 'failed', returnedTo: 'PC-IMV' } as const
    expectRefusal(() => end(world, trialId, { ...failed, rulesMet: ['unheard_of'] }), 'INVALID', 'rulesMet')
    end(world, trialId, { ...failed, rulesMet: ['systolic_high'] })
    expect(rowsOf(world)[0]?.rulesMet).toEqual(['systolic_high'])
  })

  it('shows the second person the first one’s end', () => {
    const world = makeWorld()
    const { trialId } = onTrial(world)
    end(world, trialId, { reason: 'well throughout' })
    const run = () => endTrial(makeCtx(world.db, world.physician), trialEnd(world.episode.id, trialId, { reason: 'also' }))
    expectRefusal(run, 'CONFLICT', undefined, /Robin Therapist recorded the end of this trial at 07:50: passed/)
  })

  it('refuses an end before the start and before the last look', () => {
    const world = makeWorld()
    const { trialId } = onTrial(world)
    look(world, trialId, -15)
    const stopped = { outcome: 'stopped', reason: 'scan', returnedTo: 'as before' } as const
    expectRefusal(
      () => end(world, trialId, { ...stopped, observed: at(minute(-41)) }),
      'INVALID',
      'observed.time',
      /started at 07:20/,
    )
    expectRefusal(
      () => end(world, trialId, { ...stopped, observed: at(minute(-16)) }),
      'INVALID',
      'observed.time',
      /stands at 07:45/,
    )
  })

  it('amends an end once', () => {
    const world = makeWorld()
    const { trialId } = onTrial(world)
    const first = end(world, trialId, { reason: 'well throughout' })
    const amends = { id: first.id, reason: 'wrong patient’s sheet' }
    end(world, trialId, { outcome: 'failed', reason: 'tired', returnedTo: 'PC-IMV', amends })
    expectRefusal(() => end(world, trialId, { reason: 'again', amends }), 'CONFLICT')
    expect(rowsOf(world).map(({ outcome }) => outcome)).toEqual(['passed', 'failed'])
  })

  it('asks what a failed trial returned to, and why one was stopped', () => {
    const base = { ...trialEnd('e', 't'), returnedTo: '', reason: null }
    const fieldsOf = (outcome: string) =>
      endTrialSchema.safeParse({ ...base, outcome }).error?.issues.map((issue) => issue.path.join('.')) ?? []
    expect(fieldsOf('passed')).toEqual([])
    expect(fieldsOf('failed')).toEqual(['returnedTo'])
    expect(fieldsOf('stopped')).toEqual(['returnedTo', 'reason'])
  })
})
