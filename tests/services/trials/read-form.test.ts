import { describe, expect, it } from 'vitest'
import { endTrial } from '@/lib/services/trials/end'
import { observeTrial } from '@/lib/services/trials/observe'
import { readTrialForm } from '@/lib/services/trials/read-form'
import { makeCtx, makeWorld } from '../../helpers/factories'
import { CALM, heldSince, minute, onTrial, screened, trialEnd, trialLook } from '../../helpers/steps'
import { at, expectDoor, expectRefusal } from '../../helpers/verb-checks'

describe('readTrialForm', () => {
  it('says what is missing before a trial and when the pairing window closes', () => {
    const world = makeWorld()
    screened(world)
    heldSince(world)
    const { readiness, running, may } = readTrialForm(makeCtx(world.db, world.rt), { episodeId: world.episode.id })
    expect(readiness).toMatchObject({
      isInOrder: false,
      missing: ['the sedation hold started at 07:10 has no outcome yet'],
      pairingWindowClosesMs: minute(70),
      screen: { result: 'ready', recordedByName: 'Robin Therapist' },
      hold: { start: 'started', outcome: null },
    })
    expect(running).toBeNull()
    expect(may).toEqual({ start: true, observe: true, end: true })
  })

  it('shows a running trial: planned end, the next look due, each look with its minute and RSBI, each rule’s state', () => {
    const world = makeWorld()
    const ctx = makeCtx(world.db, world.rt)
    const { trialId, id } = onTrial(world)
    observeTrial(
      ctx,
      trialLook(world.episode.id, trialId, {
        observed: at(minute(-38)),
        readings: { ...CALM, breathsPerMin: 21, tidalVolumeMl: 200 },
      }),
    )
    observeTrial(
      ctx,
      trialLook(world.episode.id, trialId, {
        observed: at(minute(-35)),
        readings: { ...CALM, heartRatePerMin: 106, tidalVolumeMl: null },
      }),
    )
    const form = readTrialForm(makeCtx(world.db, world.nurse), { episodeId: world.episode.id })
    expect(form.running).toMatchObject({
      id,
      entryId: trialId,
      plannedEndMs: minute(-10),
      baselineRsbi: 50,
      nextObservation: { minute: 10, dueMs: minute(-30) },
    })
    // R-RSBI-6: 21 breaths of 200 mL, exactly 105 (derived).
    expect(form.running?.observations.map(({ minute: at_, rsbi }) => [at_, rsbi])).toEqual([
      [2, 105],
      [5, null],
    ])
    // Heart rate 88 to 106 is a rise of 20.5 %: beyond the limit, not yet for 5 min.
    expect(form.running?.rules.find(({ id: rule }) => rule === 'heart_rate_rise')).toMatchObject({
      state: 'near',
      sinceMs: minute(-35),
      reachedAtMs: minute(-30),
    })
    expect(form.running?.rules.find(({ id: rule }) => rule === 'systolic_low')).toMatchObject({ state: 'clear' })
    expect(form.seenLatestId).toBe(id)
    expect(form.may).toEqual({ start: false, observe: true, end: false })
    expect(form.move).toMatchObject({ kind: 'move', step: 'end_trial' })
  })

  it('lists an ended trial with its end in words', () => {
    const world = makeWorld()
    const ctx = makeCtx(world.db, world.rt)
    const { trialId } = onTrial(world)
    endTrial(ctx, trialEnd(world.episode.id, trialId, { outcome: 'failed', rulesMet: ['systolic_high'], returnedTo: 'PC-IMV' }))
    const form = readTrialForm(ctx, { episodeId: world.episode.id })
    expect(form.running).toBeNull()
    expect(form.trials[0]?.end?.rulesMet).toEqual([
      { id: 'systolic_high', words: 'systolic blood pressure above 180 mmHg for 5 min' },
    ])
    expect(form.readiness.missing).toEqual(['a trial failed at 07:50 and no screen is recorded since'])
  })

  it('opens to correct a start, a look or an end, and only the current version', () => {
    const world = makeWorld()
    const ctx = makeCtx(world.db, world.rt)
    const { trialId, id } = onTrial(world)
    const look = observeTrial(ctx, trialLook(world.episode.id, trialId))
    const end = endTrial(ctx, trialEnd(world.episode.id, trialId))
    const kindOf = (amend: string) => readTrialForm(ctx, { episodeId: world.episode.id, amend }).amending?.kind
    expect([kindOf(id), kindOf(look.id), kindOf(end.id)]).toEqual(['start', 'observation', 'end'])
    expectRefusal(() => kindOf('absent'), 'NOT_FOUND')
  })

  it('refuses a person from another unit', () => {
    const world = makeWorld()
    expectDoor(world, readTrialForm, { episodeId: world.episode.id }, null)
  })
})
