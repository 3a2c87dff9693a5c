import { describe, expect, it } from 'vitest'
import { endHold } from '@/lib/services/holds/end'
import { observeHold } from '@/lib/services/holds/observe'
import { readHoldForm } from '@/lib/services/holds/read-form'
import { defaultProtocol } from '@/lib/weaning/published/default-protocol'
import { makeCtx, makeWorld } from '../../helpers/factories'
import { addVersion, heldSince, holdEnd, holdLook, minute, NOTHING_SEEN, PROPOFOL, screened } from '../../helpers/steps'
import { at, expectDoor, expectRefusal } from '../../helpers/verb-checks'

describe('readHoldForm', () => {
  it('shows the latest screen and nothing running before the hold', () => {
    const world = makeWorld()
    screened(world)
    const form = readHoldForm(makeCtx(world.db, world.nurse), { episodeId: world.episode.id })
    expect(form).toMatchObject({
      running: null,
      holds: [],
      lastInfusions: null,
      amending: null,
      seenLatestId: null,
      latestScreen: { result: 'ready', observedAt: minute(-60), recordedByName: 'Robin Therapist' },
      may: { start: true, observe: true, end: true },
      move: { kind: 'move', step: 'hold', role: 'nurse' },
    })
  })

  it('shows a running hold with its looks, what is due next, the state of each rule and the restart rates', () => {
    const world = makeWorld()
    screened(world)
    const { holdId, id } = heldSince(world)
    const ctx = makeCtx(world.db, world.nurse)
    observeHold(
      ctx,
      holdLook(world.episode.id, holdId, { observed: at(minute(-20)), readings: { ...NOTHING_SEEN, breathsPerMin: 38 } }),
    )
    const { running, seenLatestId, may } = readHoldForm(makeCtx(world.db, world.rt), { episodeId: world.episode.id })
    expect(running).toMatchObject({
      id,
      entryId: holdId,
      nextObservationDueMs: minute(10),
      toleratedByTimeAtMs: minute(190),
      eyesOpenedAtMs: null,
      isTolerated: false,
      restartFraction: 0.5,
      restartsIfNotTolerated: [{ drug: 'propofol', rateBefore: 30, rate: 15 }],
    })
    expect(running?.observations).toHaveLength(1)
    const high = running?.rules.find(({ words }) => words.includes('respiratory rate above 35'))
    expect(high).toMatchObject({ state: 'near', sinceMs: minute(-20), reachedAtMs: minute(-15), lastValue: 38 })
    expect(running?.rules.filter(({ state }) => state === 'met')).toEqual([])
    expect(seenLatestId).toBe(id)
    expect(may).toEqual({ start: false, observe: true, end: false })
  })

  it('keeps the protocol that a running hold began under', () => {
    const world = makeWorld()
    heldSince(world)
    addVersion(world.db, world, { ...defaultProtocol, hold: { ...defaultProtocol.hold, restartFraction: 0.25 } }, minute(-10))
    const form = readHoldForm(makeCtx(world.db, world.nurse), { episodeId: world.episode.id })
    expect(form.protocol.number).toBe(1)
    expect(form.running?.restartsIfNotTolerated).toMatchObject([{ rate: 15 }])
  })

  it('moves an ended hold to today’s holds and offers its infusions for the next one', () => {
    const world = makeWorld()
    const ctx = makeCtx(world.db, world.nurse)
    const { holdId } = heldSince(world)
    endHold(ctx, holdEnd(world.episode.id, holdId, { outcome: 'not_tolerated', note: 'agitated' }))
    const form = readHoldForm(ctx, { episodeId: world.episode.id })
    expect(form.running).toBeNull()
    expect(form.holds).toMatchObject([
      { entryId: holdId, end: { outcome: 'not_tolerated', rulesMet: [], restarts: [{ rate: 15 }], recordedByName: 'Noa Nurse' } },
    ])
    expect(form.lastInfusions?.infusions[0]).toEqual(PROPOFOL)
  })

  it('opens to correct a start, a look or an end, and only the current version', () => {
    const world = makeWorld()
    const ctx = makeCtx(world.db, world.nurse)
    const { holdId, id } = heldSince(world)
    const look = observeHold(ctx, holdLook(world.episode.id, holdId))
    const end = endHold(ctx, holdEnd(world.episode.id, holdId, { note: 'calm' }))
    const kindOf = (amend: string) => readHoldForm(ctx, { episodeId: world.episode.id, amend }).amending?.kind
    expect([kindOf(id), kindOf(look.id), kindOf(end.id)]).toEqual(['start', 'observation', 'end'])
    observeHold(ctx, holdLook(world.episode.id, holdId, { amends: { id: look.id, reason: 'typed wrongly' } }))
    expectRefusal(() => kindOf(look.id), 'NOT_FOUND')
    expectRefusal(() => kindOf('absent'), 'NOT_FOUND')
  })

  it('refuses a person from another unit', () => {
    const world = makeWorld()
    expectDoor(world, readHoldForm, { episodeId: world.episode.id }, null)
  })
})
