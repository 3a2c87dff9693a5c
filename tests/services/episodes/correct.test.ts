import { eq } from 'drizzle-orm'
import { describe, expect, it } from 'vitest'
import { POST } from '@/app/api/episodes/[episodeId]/correct/route'
import { airwayEvents, episodes } from '@/db/schema'
import type { CorrectEpisodeInput } from '@/lib/schemas/episodes'
import { correctEpisode } from '@/lib/services/episodes/correct'
import { HOUR_MS, MINUTE_MS } from '@/lib/shared/time'
import { auditRows, entryPlace, makeCtx, makeEpisode, makeSettings, makeWorld, NOW } from '../../helpers/factories'
import { makeRequest, makeSession, routeParams, serveDatabase } from '../../helpers/test-server'
import { at, expectDoor, expectNothingLeft, expectOnce, expectRefusal } from '../../helpers/verb-checks'

type World = ReturnType<typeof makeWorld>
const ENDED = NOW - 2 * HOUR_MS

/** The world's episode ended two hours ago, recorded by the nurse. */
function makeEnded() {
  const world = makeWorld()
  world.db.update(episodes).set({ endedAt: ENDED, end: 'extubated', endRecordedAt: ENDED, endRecordedBy: world.nurse.id }).run()
  world.db
    .insert(airwayEvents)
    .values({
      ...entryPlace(world.episode, { ...world.place, recordedBy: world.nurse.id }, ENDED),
      event: 'extubated',
      supportAfter: 'niv',
    })
    .run()
  return world
}
const given = (world: World, over: Partial<CorrectEpisodeInput> = {}): CorrectEpisodeInput => ({
  episodeId: world.episode.id,
  version: 1,
  began: { observed: at(world.episode.startedAt), start: 'intubated' },
  ended: { observed: at(ENDED), end: 'extubated' },
  reason: 'wrong hour',
  ...over,
})
const episodeOf = (world: World) => world.db.select().from(episodes).where(eq(episodes.id, world.episode.id)).get()
const events = (world: World) => world.db.select().from(airwayEvents).all()

describe('correctEpisode', () => {
  it('moves the end and adds a version of its event; the old version stays', () => {
    const world = makeEnded()
    correctEpisode(
      makeCtx(world.db, world.nurse),
      given(world, { ended: { observed: at(ENDED + HOUR_MS), end: 'self_extubated' } }),
    )
    expect(episodeOf(world)).toMatchObject({
      endedAt: ENDED + HOUR_MS,
      end: 'self_extubated',
      version: 2,
      startedAt: world.episode.startedAt,
    })
    const [, old, corrected] = events(world)
    expect(old).toMatchObject({ event: 'extubated', observedAt: ENDED, entryVersion: 1 })
    expect(corrected).toMatchObject({
      event: 'self_extubated',
      observedAt: ENDED + HOUR_MS,
      entryVersion: 2,
      supersedesId: old?.id,
      amendReason: 'wrong hour',
      supportAfter: 'niv',
    })
    expect(events(world)).toHaveLength(3)
    expect(auditRows(world.db, 'episode.correct')).toMatchObject([
      { before: { endedAt: ENDED }, after: { reason: 'wrong hour' } },
    ])
  })

  it('moves the beginning and adds a version of its event', () => {
    const world = makeWorld()
    const began = world.episode.startedAt - 2 * HOUR_MS
    correctEpisode(
      makeCtx(world.db, world.rt),
      given(world, { began: { observed: at(began), start: 'arrived_intubated' }, ended: null }),
    )
    expect(episodeOf(world)).toMatchObject({ startedAt: began, start: 'arrived_intubated', endedAt: null })
    expect(events(world)).toMatchObject([
      { event: 'intubated' },
      { event: 'arrived_intubated', observedAt: began, entryVersion: 2 },
    ])
  })

  it('opens the episode again when it did not end after all, and withdraws the event', () => {
    const world = makeEnded()
    correctEpisode(makeCtx(world.db, world.physician), given(world, { ended: null }))
    expect(episodeOf(world)).toMatchObject({ endedAt: null, end: null })
    expect(events(world).at(-1)).toMatchObject({ event: 'extubated', isWithdrawn: true, entryVersion: 2, observedAt: ENDED })
  })

  it('withdraws the event when the end was a death, and writes one when it was not', () => {
    const world = makeEnded()
    const ctx = makeCtx(world.db, world.physician)
    correctEpisode(ctx, given(world, { ended: { observed: at(ENDED), end: 'died' } }))
    expect(events(world).at(-1)).toMatchObject({ event: 'extubated', isWithdrawn: true })
    correctEpisode(ctx, given(world, { version: 2, ended: { observed: at(ENDED), end: 'extubated' } }))
    expect(events(world).at(-1)).toMatchObject({ event: 'extubated', isWithdrawn: false, entryVersion: 1 })
    expect(episodeOf(world)?.end).toBe('extubated')
  })

  it('refuses times that the record contradicts, at their field', () => {
    const world = makeEnded()
    const ctx = makeCtx(world.db, world.physician)
    makeSettings(world.db, world.episode, world.place, { observedAt: NOW - 4 * HOUR_MS })
    const end = (ms: number) => () => correctEpisode(ctx, given(world, { ended: { observed: at(ms), end: 'extubated' } }))
    const begin = (ms: number) => () => correctEpisode(ctx, given(world, { began: { observed: at(ms), start: 'intubated' } }))
    expectRefusal(end(NOW - 5 * HOUR_MS), 'INVALID', 'ended.observed.time', /entry stands at 04:00/)
    expectRefusal(end(NOW + HOUR_MS), 'INVALID', 'ended.observed.time', /future/)
    expectRefusal(end(world.episode.startedAt - HOUR_MS), 'INVALID', 'ended.observed.time', /before ventilation began/)
    expectRefusal(begin(NOW - 3 * HOUR_MS), 'INVALID', 'began.observed.time', /entry stands at 04:00/)
    expectRefusal(begin(world.stay.startedAt - HOUR_MS), 'INVALID', 'began.observed.time', /no bed here/)
    expect(episodeOf(world)).toMatchObject({ version: 1, endedAt: ENDED })
  })

  it('keeps clear of the next episode', () => {
    const world = makeEnded()
    const next = NOW - 90 * MINUTE_MS
    makeEpisode(world.db, { ...world.place, patientId: world.patient.id }, { startedAt: next, start: 'reintubated' })
    const ctx = makeCtx(world.db, world.physician)
    expectRefusal(() => correctEpisode(ctx, given(world, { ended: null })), 'PRECONDITION')
    expectRefusal(
      () => correctEpisode(ctx, given(world, { ended: { observed: at(NOW - HOUR_MS), end: 'extubated' } })),
      'INVALID',
      'ended.observed.time',
      /begun again/,
    )
  })

  it('refuses an end that does not go with the airway', () => {
    const world = makeEnded()
    const input = given(world, { ended: { observed: at(ENDED), end: 'ventilator_off' } })
    expectRefusal(() => correctEpisode(makeCtx(world.db, world.physician), input), 'INVALID', 'ended.end')
  })

  it('does not end a running episode', () => {
    const world = makeWorld()
    expectRefusal(() => correctEpisode(makeCtx(world.db, world.physician), given(world)), 'PRECONDITION')
  })

  it('refuses when nothing is different, when the form is stale, and a colleague who is neither author nor physician', () => {
    const world = makeEnded()
    const changed = given(world, { ended: { observed: at(ENDED + HOUR_MS), end: 'extubated' } })
    expectRefusal(() => correctEpisode(makeCtx(world.db, world.nurse), given(world)), 'INVALID')
    expectRefusal(() => correctEpisode(makeCtx(world.db, world.nurse), { ...changed, version: 0 }), 'CONFLICT')
    expectRefusal(() => correctEpisode(makeCtx(world.db, world.rt), changed), 'FORBIDDEN')
  })

  it('refuses a unit lead and a person from another unit', () => {
    const world = makeEnded()
    expectDoor(world, correctEpisode, given(world, { ended: null }), world.lead)
  })

  it('leaves nothing behind when the audit row cannot be written', () => {
    const world = makeEnded()
    expectNothingLeft(makeCtx(world.db, world.physician), correctEpisode, given(world, { ended: null }), 'episode.correct')
  })

  it('corrects once for a request that arrives twice', () => {
    const world = makeEnded()
    const input = given(world, { ended: { observed: at(ENDED + HOUR_MS), end: 'extubated' } })
    expectOnce(world.db, world.nurse, correctEpisode, input, { ...input, reason: 'another reason' })
  })

  it('answers through its route', async () => {
    const world = makeEnded()
    serveDatabase(world.db)
    const { cookie } = makeSession(world.db, world.physician.id)
    const { episodeId, ...body } = given(world, { ended: null })
    expect((await POST(makeRequest('/api/x', { body, cookie }), routeParams({ episodeId }))).status).toBe(200)
    expect(
      (await POST(makeRequest('/api/x', { body: { ...body, reason: '' }, cookie }), routeParams({ episodeId }))).status,
    ).toBe(422)
  })
})
