import { describe, expect, it } from 'vitest'
import { trialObservations } from '@/db/schema'
import { endTrial } from '@/lib/services/trials/end'
import { observeTrial } from '@/lib/services/trials/observe'
import { defaultProtocol } from '@/lib/weaning/published/default-protocol'
import { auditRows, makeCtx, makeWorld, NOW } from '../../helpers/factories'
import { addVersion, CALM, minute, NOTHING_SEEN, onTrial, trialEnd, trialLook } from '../../helpers/steps'
import { at, expectDoor, expectNothingLeft, expectOnce, expectRefusal } from '../../helpers/verb-checks'

describe('observeTrial', () => {
  it('keeps the readings under the trial and writes the audit row; a nurse may add one', () => {
    const world = makeWorld()
    const { trialId } = onTrial(world)
    const answer = observeTrial(makeCtx(world.db, world.nurse), trialLook(world.episode.id, trialId))
    expect(world.db.select().from(trialObservations).all()).toMatchObject([
      { id: answer.id, trialId, readings: CALM, observedAt: minute(-30), recordedAt: NOW, recordedBy: world.nurse.id },
    ])
    expect(answer.rulesMet).toEqual([])
    expect(auditRows(world.db, 'trial.observe')).toMatchObject([{ subjectId: answer.id, actorId: world.nurse.id }])
  })

  it('refuses a unit lead and a person from another unit', () => {
    const world = makeWorld()
    const { trialId } = onTrial(world)
    expectDoor(world, observeTrial, trialLook(world.episode.id, trialId), world.lead)
  })

  it('leaves nothing behind when the audit row cannot be written', () => {
    const world = makeWorld()
    const { trialId } = onTrial(world)
    expectNothingLeft(makeCtx(world.db, world.rt), observeTrial, trialLook(world.episode.id, trialId), 'trial.observe')
  })

  it('records a request that arrives twice once', () => {
    const world = makeWorld()
    const { trialId } = onTrial(world)
    const other = trialLook(world.episode.id, trialId, { readings: { ...CALM, breathsPerMin: 24 } })
    expectOnce(world.db, world.rt, observeTrial, trialLook(world.episode.id, trialId), other)
    expect(world.db.select().from(trialObservations).all()).toHaveLength(1)
  })

  // R-S4 and R-S5 by the ABC list: f 37 for 4 min, then 30: continue; f 36 for 6 min: fail (Girard 2008, from memory).
  it.each([
    [
      'continues after f 37 for 4 min, then 30',
      [
        [-38, 37],
        [-34, 37],
        [-30, 30],
      ],
      0,
    ],
    [
      'stops after f 36 for 6 min',
      [
        [-38, 36],
        [-32, 36],
      ],
      1,
    ],
    [
      'stops after f 36 for exactly 5 min',
      [
        [-38, 36],
        [-33, 36],
      ],
      1,
    ],
    [
      'continues at f exactly 35',
      [
        [-38, 35],
        [-28, 35],
      ],
      0,
    ],
  ] as const)('%s', (_title, looks, count) => {
    const world = makeWorld()
    const { trialId } = onTrial(world)
    const answers = looks.map(([minutes, breathsPerMin]) =>
      observeTrial(
        makeCtx(world.db, world.rt),
        trialLook(world.episode.id, trialId, {
          observed: at(minute(minutes)),
          readings: { ...NOTHING_SEEN, breathsPerMin },
        }),
      ),
    )
    expect(answers.at(-1)?.rulesMet).toHaveLength(count)
  })

  it('counts two looks in their order of time, though they were typed in the other order', () => {
    const world = makeWorld()
    const { trialId } = onTrial(world)
    const look = (minutes: number) =>
      observeTrial(
        makeCtx(world.db, world.rt),
        trialLook(world.episode.id, trialId, {
          observed: at(minute(minutes)),
          readings: { ...NOTHING_SEEN, breathsPerMin: 38 },
        }),
      )
    expect(look(-20).rulesMet).toEqual([])
    expect(look(-27).rulesMet).toHaveLength(1)
  })

  it('stays with the protocol version of its start when another comes into force meanwhile', () => {
    const world = makeWorld()
    const { trialId } = onTrial(world)
    addVersion(world.db, world, { ...defaultProtocol, trial: { ...defaultProtocol.trial, stopRules: [] } }, minute(-35))
    const low = { ...NOTHING_SEEN, systolicMmHg: 85 }
    const answer = observeTrial(makeCtx(world.db, world.rt), trialLook(world.episode.id, trialId, { readings: low }))
    expect(answer.rulesMet).toEqual(['systolic_low'])
    const [row] = world.db.select().from(trialObservations).all()
    expect(row?.protocolVersionId).toBe(world.medical.protocolVersion.id)
  })

  it('refuses a time outside the trial, and finds no other trial', () => {
    const world = makeWorld()
    const ctx = makeCtx(world.db, world.rt)
    const { trialId } = onTrial(world)
    const look = (minutes: number, id = trialId) =>
      observeTrial(ctx, trialLook(world.episode.id, id, { observed: at(minute(minutes)) }))
    expectRefusal(() => look(-41), 'INVALID', 'observed.time', /started at 07:20/)
    expectRefusal(() => look(-30, 'absent'), 'NOT_FOUND')
    expectRefusal(() => look(5), 'INVALID', 'observed.time', /future/)
    endTrial(ctx, trialEnd(world.episode.id, trialId, { outcome: 'stopped', reason: 'scan', returnedTo: 'as before' }))
    expectRefusal(() => look(-9), 'INVALID', 'observed.time', /ended at 07:50/)
    expect(look(-11).rulesMet).toEqual([])
  })

  it('amends a look once', () => {
    const world = makeWorld()
    const ctx = makeCtx(world.db, world.rt)
    const { trialId } = onTrial(world)
    const low = { ...NOTHING_SEEN, systolicMmHg: 85 }
    const first = observeTrial(ctx, trialLook(world.episode.id, trialId, { readings: low }))
    const amend = trialLook(world.episode.id, trialId, { readings: CALM, amends: { id: first.id, reason: 'cuff slipped' } })
    expect(observeTrial(ctx, amend).rulesMet).toEqual([])
    expectRefusal(() => observeTrial(ctx, amend), 'CONFLICT')
    expect(auditRows(world.db, 'trial.amend_observation')).toHaveLength(1)
  })
})
