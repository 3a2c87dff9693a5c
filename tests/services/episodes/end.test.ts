import { eq } from 'drizzle-orm'
import { describe, expect, it } from 'vitest'
import { POST } from '@/app/api/episodes/[episodeId]/end/route'
import { airwayEvents, decisions, episodes, trialEnds, trials } from '@/db/schema'
import { endEpisodeSchema, type EndEpisodeInput } from '@/lib/schemas/episodes'
import { endEpisode } from '@/lib/services/episodes/end'
import { HOUR_MS, MINUTE_MS } from '@/lib/shared/time'
import type { DecisionChoice } from '@/lib/weaning/vocabulary'
import { auditRows, entryPlace, makeCtx, makeSettings, makeWorld, NOW } from '../../helpers/factories'
import { makeRequest, makeSession, routeParams, serveDatabase } from '../../helpers/test-server'
import { at, expectDoor, expectNothingLeft, expectOnce, expectRefusal } from '../../helpers/verb-checks'

type World = ReturnType<typeof makeWorld>

const given = (world: World, over: Partial<EndEpisodeInput> = {}): EndEpisodeInput => ({
  episodeId: world.episode.id,
  version: 1,
  observed: at(NOW - 10 * MINUTE_MS),
  end: 'extubated',
  supportAfter: 'high_flow',
  reason: null,
  trialEnd: null,
  ...over,
})

function sign(world: World, choice: DecisionChoice = 'extubate', signedAt: number = NOW - HOUR_MS) {
  world.db
    .insert(decisions)
    .values({
      ...entryPlace(world.episode, { ...world.place, recordedBy: world.physician.id }, signedAt),
      choice,
      reasons: [],
      evidence: {},
      contentHash: 'h',
      statement: 's',
      lookAgainAt: choice === 'not_today' ? NOW + HOUR_MS : null,
    })
    .run()
}
const BASELINE = {
  breathsPerMin: 18,
  tidalVolumeMl: 420,
  spo2Percent: 96,
  heartRatePerMin: 84,
  systolicMmHg: 124,
  diastolicMmHg: 70,
  rass: 0,
  paCO2MmHg: null,
  paO2MmHg: null,
  ph: null,
  signs: [],
}
function runTrial(world: World, startedAt: number, plannedDurationMin = 30) {
  return world.db
    .insert(trials)
    .values({
      ...entryPlace(world.episode, world.place, startedAt),
      technique: 't_piece',
      fio2Fraction: 0.4,
      plannedDurationMin,
      baseline: BASELINE,
    })
    .returning()
    .get()
}
const episodeOf = (world: World) => world.db.select().from(episodes).where(eq(episodes.id, world.episode.id)).get()
const endEvents = (world: World) => world.db.select().from(airwayEvents).all().slice(1)

describe('endEpisode', () => {
  it('ends a planned extubation that was signed today, with its event, the support and the audit row', () => {
    const world = makeWorld()
    sign(world)
    expect(endEpisode(makeCtx(world.db, world.rt), given(world))).toEqual({
      episodeId: world.episode.id,
      endedAt: NOW - 10 * MINUTE_MS,
    })
    expect(episodeOf(world)).toMatchObject({
      endedAt: NOW - 10 * MINUTE_MS,
      end: 'extubated',
      endRecordedAt: NOW,
      endRecordedBy: world.rt.id,
      version: 2,
    })
    expect(endEvents(world)).toMatchObject([
      { event: 'extubated', supportAfter: 'high_flow', reason: null, observedAt: NOW - 10 * MINUTE_MS },
    ])
    expect(auditRows(world.db, 'episode.end')).toMatchObject([{ subjectId: world.episode.id, actorId: world.rt.id }])
  })

  it.each([
    ['no decision at all', () => undefined],
    ['a decision against it today', (world: World) => sign(world, 'not_today')],
    ['a decision for it two days ago', (world: World) => sign(world, 'extubate', NOW - 47 * HOUR_MS)],
    [
      'a later decision against it',
      (world: World) => {
        sign(world, 'extubate', NOW - 2 * HOUR_MS)
        sign(world, 'not_today', NOW - HOUR_MS)
      },
    ],
  ])('asks for a reason when there is %s, and keeps it', (_name, prepare) => {
    const world = makeWorld()
    prepare(world)
    const ctx = makeCtx(world.db, world.rt)
    expectRefusal(() => endEpisode(ctx, given(world)), 'INVALID', 'reason', /No signed decision/)
    expect(episodeOf(world)?.endedAt).toBeNull()
    endEpisode(ctx, given(world, { reason: 'Agreed at the bedside' }))
    expect(endEvents(world)).toMatchObject([{ event: 'extubated', reason: 'Agreed at the bedside' }])
  })

  it('takes a decision of the evening before shortly after midnight', () => {
    const world = makeWorld()
    const midnight = NOW - 8 * HOUR_MS
    sign(world, 'comfort_extubation', midnight - 30 * MINUTE_MS)
    expect(endEpisode(makeCtx(world.db, world.rt), given(world, { observed: at(midnight + 20 * MINUTE_MS) })).endedAt).toBe(
      midnight + 20 * MINUTE_MS,
    )
  })

  it('asks how a running trial ended before a planned extubation, and records it', () => {
    const world = makeWorld()
    sign(world)
    const trial = runTrial(world, NOW - 50 * MINUTE_MS)
    const ctx = makeCtx(world.db, world.rt)
    expectRefusal(() => endEpisode(ctx, given(world)), 'INVALID', 'trialEnd.outcome', /trial is running/)
    expect(world.db.select().from(trialEnds).all()).toEqual([])
    endEpisode(ctx, given(world, { trialEnd: { outcome: 'passed' } }))
    expect(world.db.select().from(trialEnds).all()).toMatchObject([
      {
        trialId: trial.id,
        outcome: 'passed',
        rulesMet: [],
        observedAt: NOW - 10 * MINUTE_MS,
        protocolVersionId: world.medical.protocolVersion.id,
      },
    ])
    expect(auditRows(world.db, 'trial.end')).toHaveLength(1)
  })

  it('asks why a trial counts as passed before its planned end', () => {
    const world = makeWorld()
    sign(world)
    runTrial(world, NOW - 20 * MINUTE_MS)
    const ctx = makeCtx(world.db, world.rt)
    expectRefusal(
      () => endEpisode(ctx, given(world, { trialEnd: { outcome: 'passed' } })),
      'INVALID',
      'trialEnd.reason',
      /planned length/,
    )
    endEpisode(ctx, given(world, { trialEnd: { outcome: 'passed', reason: 'Awake and strong' } }))
    expect(world.db.select().from(trialEnds).get()?.reason).toBe('Awake and strong')
  })

  it('takes an unplanned extubation at any step and closes nothing else', () => {
    const world = makeWorld()
    runTrial(world, NOW - 30 * MINUTE_MS)
    endEpisode(makeCtx(world.db, world.nurse), given(world, { end: 'self_extubated', supportAfter: 'oxygen' }))
    expect(endEvents(world)).toMatchObject([{ event: 'self_extubated' }])
    expect(world.db.select().from(trialEnds).all()).toEqual([])
  })

  it.each(['died', 'left_hospital'] as const)('ends by %s without an airway event', (end) => {
    const world = makeWorld()
    endEpisode(makeCtx(world.db, world.physician), given(world, { end, supportAfter: null }))
    expect(episodeOf(world)).toMatchObject({ end, endedAt: NOW - 10 * MINUTE_MS })
    expect(endEvents(world)).toEqual([])
  })

  it('takes the ventilator off a tracheostomy, and refuses it with a tube', () => {
    const world = makeWorld()
    const ctx = makeCtx(world.db, world.rt)
    const off = given(world, { end: 'ventilator_off' })
    expectRefusal(() => endEpisode(ctx, off), 'INVALID', 'end', /tracheostomy/)
    world.db.update(episodes).set({ airway: 'tracheostomy' }).run()
    expectRefusal(() => endEpisode(ctx, given(world)), 'INVALID', 'end', /ventilator off/)
    endEpisode(ctx, off)
    expect(endEvents(world)).toMatchObject([{ event: 'ventilator_off' }])
  })

  it('refuses an end before an entry that stands', () => {
    const world = makeWorld()
    sign(world)
    makeSettings(world.db, world.episode, world.place, { observedAt: NOW - 5 * MINUTE_MS })
    expectRefusal(
      () => endEpisode(makeCtx(world.db, world.rt), given(world)),
      'INVALID',
      'observed.time',
      /entry stands at 07:55/,
    )
  })

  it('refuses an end before the beginning and in the future', () => {
    const world = makeWorld()
    sign(world)
    const end = (ms: number) => () =>
      endEpisode(makeCtx(world.db, world.rt), given(world, { observed: at(ms), end: 'died', supportAfter: null }))
    expectRefusal(end(world.episode.startedAt - HOUR_MS), 'INVALID', 'observed.time', /before ventilation began/)
    expectRefusal(end(NOW + HOUR_MS), 'INVALID', 'observed.time', /future/)
  })

  it('refuses a second end, and a form opened before someone changed the episode', () => {
    const world = makeWorld()
    sign(world)
    const ctx = makeCtx(world.db, world.rt)
    expectRefusal(() => endEpisode(ctx, given(world, { version: 7 })), 'CONFLICT')
    expect(episodeOf(world)?.endedAt).toBeNull()
    endEpisode(ctx, given(world))
    expectRefusal(() => endEpisode(ctx, given(world)), 'CONFLICT', undefined, /already ended, at 07:50/)
    expect(endEvents(world)).toHaveLength(1)
  })

  it('refuses a unit lead and a person from another unit', () => {
    const world = makeWorld()
    sign(world)
    expectDoor(world, endEpisode, given(world), world.lead)
  })

  it('leaves nothing behind when the audit row cannot be written, not even the trial’s end', () => {
    const world = makeWorld()
    sign(world)
    runTrial(world, NOW - 50 * MINUTE_MS)
    expectNothingLeft(makeCtx(world.db, world.rt), endEpisode, given(world, { trialEnd: { outcome: 'passed' } }), 'episode.end')
  })

  it('ends once for a request that arrives twice', () => {
    const world = makeWorld()
    sign(world)
    expectOnce(world.db, world.rt, endEpisode, given(world), given(world, { supportAfter: 'niv' }))
    expect(endEvents(world)).toHaveLength(1)
  })

  it('answers through its route', async () => {
    const world = makeWorld()
    serveDatabase(world.db)
    const { cookie } = makeSession(world.db, world.rt.id)
    const { episodeId, ...body } = given(world, { observed: at(Date.now() - MINUTE_MS), end: 'self_extubated' })
    expect(
      (
        await POST(
          makeRequest('/api/x', { body: { ...body, end: 'extubated', supportAfter: null }, cookie }),
          routeParams({ episodeId }),
        )
      ).status,
    ).toBe(422)
    expect((await POST(makeRequest('/api/x', { body, cookie }), routeParams({ episodeId }))).status).toBe(200)
    expect(episodeOf(world)?.end).toBe('self_extubated')
  })
})

describe('what the form asks for', () => {
  it('the support after a planned extubation, and none after a death', () => {
    const issues = (over: object) => {
      const parsed = endEpisodeSchema.safeParse({ episodeId: 'e', version: 1, observed: at(NOW), end: 'extubated', ...over })
      return parsed.success ? [] : parsed.error.issues.map((issue) => issue.path.join('.'))
    }
    expect(issues({})).toEqual(['supportAfter'])
    expect(issues({ supportAfter: 'oxygen' })).toEqual([])
    expect(issues({ end: 'self_extubated' })).toEqual([])
    expect(issues({ end: 'died', supportAfter: 'oxygen' })).toEqual(['supportAfter'])
    expect(issues({ end: 'unknown' })).toContain('end')
  })
})
