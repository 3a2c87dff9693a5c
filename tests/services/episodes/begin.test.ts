import { describe, expect, it } from 'vitest'
import { POST } from '@/app/api/patients/[patientId]/episodes/route'
import { airwayEvents, episodes } from '@/db/schema'
import { beginEpisodeSchema, type BeginEpisodeInput } from '@/lib/schemas/episodes'
import { beginEpisode } from '@/lib/services/episodes/begin'
import { HOUR_MS, MINUTE_MS } from '@/lib/shared/time'
import type { EpisodeEnd } from '@/lib/weaning/vocabulary'
import { auditRows, makeCtx, makeEpisode, makePatient, makeStay, makeWorld, NOW, TODAY } from '../../helpers/factories'
import { makeRequest, makeSession, routeParams, serveDatabase } from '../../helpers/test-server'
import { at, expectDoor, expectNothingLeft, expectOnce, expectRefusal } from '../../helpers/verb-checks'

/** A second patient, in bed M02 since ten hours, not ventilated. */
function makeUnventilated() {
  const world = makeWorld()
  const bed = world.medical.beds[1]
  if (!bed) throw new Error('no bed')
  const other = makePatient(world.db, world.hospital.id, world.rt.id)
  const otherStay = makeStay(world.db, {
    patientId: other.id,
    unitId: world.medical.unit.id,
    bedId: bed.id,
    startedAt: NOW - 10 * HOUR_MS,
  })
  return { ...world, other, otherStay }
}
const given = (patientId: string, over: Partial<BeginEpisodeInput> = {}): BeginEpisodeInput => ({
  patientId,
  observed: at(NOW - HOUR_MS),
  start: 'intubated',
  airway: 'endotracheal_tube',
  ...over,
})
function endedEpisode(world: ReturnType<typeof makeUnventilated>, end: EpisodeEnd, endedAt: number) {
  return makeEpisode(
    world.db,
    { ...world.place, patientId: world.other.id },
    { startedAt: endedAt - 24 * HOUR_MS, endedAt, end, endRecordedAt: endedAt, endRecordedBy: world.rt.id },
  )
}

describe('beginEpisode', () => {
  it('begins the episode with its airway event and its audit row', () => {
    const world = makeUnventilated()
    const { episodeId } = beginEpisode(makeCtx(world.db, world.rt), given(world.other.id))
    expect(
      world.db
        .select()
        .from(episodes)
        .all()
        .find((row) => row.id === episodeId),
    ).toMatchObject({
      patientId: world.other.id,
      startedAt: NOW - HOUR_MS,
      start: 'intubated',
      airway: 'endotracheal_tube',
      endedAt: null,
      recordedBy: world.rt.id,
    })
    expect(
      world.db
        .select()
        .from(airwayEvents)
        .all()
        .find((row) => row.episodeId === episodeId),
    ).toMatchObject({
      event: 'intubated',
      observedAt: NOW - HOUR_MS,
      ventilatorDay: TODAY,
      unitId: world.medical.unit.id,
    })
    expect(auditRows(world.db, 'episode.begin')).toMatchObject([{ subjectId: episodeId, actorId: world.rt.id }])
  })

  it('refuses a second episode while one runs', () => {
    const world = makeUnventilated()
    expectRefusal(() => beginEpisode(makeCtx(world.db, world.nurse), given(world.patient.id)), 'CONFLICT')
    expect(world.db.select().from(episodes).all()).toHaveLength(1)
  })

  it('refuses the future and a time before the patient came', () => {
    const world = makeUnventilated()
    const begin = (ms: number) => () => beginEpisode(makeCtx(world.db, world.rt), given(world.other.id, { observed: at(ms) }))
    expectRefusal(begin(NOW + 5 * MINUTE_MS), 'INVALID', 'observed.time', /future/)
    expectRefusal(begin(NOW - 11 * HOUR_MS), 'INVALID', 'observed.time', /in this one since 2 Mar 22:00/)
    expect(begin(NOW - 10 * HOUR_MS)().episodeId).toBeTruthy()
  })

  it('takes a late entry from before a move between beds', () => {
    const world = makeUnventilated()
    const [, , third] = world.medical.beds
    world.db.$client.prepare("update stays set ended_at = ?, end = 'moved' where id = ?").run(NOW - HOUR_MS, world.otherStay.id)
    makeStay(world.db, {
      patientId: world.other.id,
      unitId: world.medical.unit.id,
      bedId: third?.id ?? '',
      startedAt: NOW - HOUR_MS,
    })
    expect(
      beginEpisode(makeCtx(world.db, world.rt), given(world.other.id, { observed: at(NOW - 3 * HOUR_MS) })).episodeId,
    ).toBeTruthy()
  })

  it('asks for reintubated within seven days of an extubation', () => {
    const world = makeUnventilated()
    endedEpisode(world, 'extubated', NOW - 9 * HOUR_MS)
    const ctx = makeCtx(world.db, world.rt)
    expectRefusal(
      () => beginEpisode(ctx, given(world.other.id)),
      'INVALID',
      'start',
      /extubated at 2 Mar 23:00. Choose reintubated/,
    )
    const { episodeId } = beginEpisode(ctx, given(world.other.id, { start: 'reintubated' }))
    expect(
      world.db
        .select()
        .from(airwayEvents)
        .all()
        .find((row) => row.episodeId === episodeId)?.event,
    ).toBe('reintubated')
  })

  it('takes an extubation of eight days ago as over', () => {
    const world = makeUnventilated()
    endedEpisode(world, 'self_extubated', NOW - 8 * 24 * HOUR_MS)
    expect(beginEpisode(makeCtx(world.db, world.rt), given(world.other.id)).episodeId).toBeTruthy()
  })

  it('refuses reintubated when no extubation is on record', () => {
    const world = makeUnventilated()
    const ctx = makeCtx(world.db, world.rt)
    expectRefusal(() => beginEpisode(ctx, given(world.other.id, { start: 'reintubated' })), 'INVALID', 'start', /No extubation/)
    endedEpisode(world, 'ventilator_off', NOW - 5 * HOUR_MS)
    expectRefusal(() => beginEpisode(ctx, given(world.other.id, { start: 'reintubated' })), 'INVALID', 'start')
  })

  it('refuses a start before the last episode ended', () => {
    const world = makeUnventilated()
    endedEpisode(world, 'extubated', NOW - 30 * MINUTE_MS)
    expectRefusal(
      () => beginEpisode(makeCtx(world.db, world.rt), given(world.other.id, { start: 'reintubated' })),
      'INVALID',
      'observed.time',
      /ended at 07:30/,
    )
  })

  it('refuses a patient who has left', () => {
    const world = makeUnventilated()
    world.db.$client
      .prepare("update stays set ended_at = ?, end = 'left_unit' where id = ?")
      .run(NOW - HOUR_MS, world.otherStay.id)
    expectRefusal(() => beginEpisode(makeCtx(world.db, world.rt), given(world.other.id)), 'PRECONDITION')
  })

  it('refuses a unit lead and a person from another unit', () => {
    const world = makeUnventilated()
    expectDoor(world, beginEpisode, given(world.other.id), world.lead)
  })

  it('leaves nothing behind when the audit row cannot be written', () => {
    const world = makeUnventilated()
    expectNothingLeft(makeCtx(world.db, world.rt), beginEpisode, given(world.other.id), 'episode.begin')
  })

  it('begins once for a request that arrives twice', () => {
    const world = makeUnventilated()
    expectOnce(world.db, world.rt, beginEpisode, given(world.other.id), given(world.other.id, { start: 'arrived_intubated' }))
    expect(world.db.select().from(episodes).all()).toHaveLength(2)
  })

  it('answers through its route', async () => {
    const world = makeUnventilated()
    serveDatabase(world.db)
    world.db.$client.prepare('update stays set started_at = ?').run(Date.now() - 5 * HOUR_MS)
    const { cookie } = makeSession(world.db, world.rt.id)
    const { patientId, ...body } = given(world.other.id, { observed: at(Date.now() - MINUTE_MS) })
    expect((await POST(makeRequest('/api/x', { body, cookie }), routeParams({ patientId }))).status).toBe(200)
    expect((await POST(makeRequest('/api/x', { body, cookie }), routeParams({ patientId }))).status).toBe(409)
  })
})

describe('which airway goes with which start', () => {
  it.each([
    ['intubated', 'endotracheal_tube', true],
    ['intubated', 'tracheostomy', false],
    ['reintubated', 'tracheostomy', false],
    ['ventilator_on', 'tracheostomy', true],
    ['ventilator_on', 'endotracheal_tube', false],
    ['arrived_intubated', 'endotracheal_tube', true],
    ['arrived_intubated', 'tracheostomy', true],
  ])('%s with %s: %s', (start, airway, isAccepted) => {
    const parsed = beginEpisodeSchema.safeParse({ ...given('p1'), start, airway })
    expect(parsed.success).toBe(isAccepted)
    if (!parsed.success) expect(parsed.error.issues.map((issue) => issue.path.join('.'))).toEqual(['airway'])
  })
})
