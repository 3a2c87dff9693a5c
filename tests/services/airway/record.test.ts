import { eq } from 'drizzle-orm'
import { describe, expect, it } from 'vitest'
import { POST } from '@/app/api/episodes/[episodeId]/airway/route'
import { airwayEvents, episodes } from '@/db/schema'
import type { RecordAirwayInput } from '@/lib/schemas/airway'
import { recordAirway } from '@/lib/services/airway/record'
import { HOUR_MS, MINUTE_MS } from '@/lib/shared/time'
import { auditRows, makeCtx, makeWorld, NOW } from '../../helpers/factories'
import { makeRequest, makeSession, routeParams, serveDatabase } from '../../helpers/test-server'
import { at, expectDoor, expectNothingLeft, expectOnce, expectRefusal } from '../../helpers/verb-checks'

const given = (episodeId: string, over: Partial<RecordAirwayInput> = {}): RecordAirwayInput => ({
  episodeId,
  observed: at(NOW - 30 * MINUTE_MS),
  amends: null,
  event: 'tracheostomy_placed',
  reason: 'Planned',
  ...over,
})
const airwayOf = (world: ReturnType<typeof makeWorld>) =>
  world.db.select().from(episodes).where(eq(episodes.id, world.episode.id)).get()

describe('recordAirway', () => {
  it('writes the event and changes the episode’s airway, with its audit row', () => {
    const world = makeWorld()
    const { id } = recordAirway(makeCtx(world.db, world.physician), given(world.episode.id))
    expect(world.db.select().from(airwayEvents).where(eq(airwayEvents.id, id)).get()).toMatchObject({
      event: 'tracheostomy_placed',
      reason: 'Planned',
    })
    expect(airwayOf(world)).toMatchObject({ airway: 'tracheostomy', version: 2, endedAt: null })
    expect(auditRows(world.db, 'airway.record')).toMatchObject([{ subjectId: id, before: { airway: 'endotracheal_tube' } }])
  })

  it('refuses a second tracheostomy', () => {
    const world = makeWorld()
    recordAirway(makeCtx(world.db, world.rt), given(world.episode.id))
    expectRefusal(() => recordAirway(makeCtx(world.db, world.nurse), given(world.episode.id)), 'PRECONDITION')
    expect(world.db.select().from(airwayEvents).all()).toHaveLength(2)
  })

  it('corrects its time without changing the airway again', () => {
    const world = makeWorld()
    const first = recordAirway(makeCtx(world.db, world.rt), given(world.episode.id))
    recordAirway(
      makeCtx(world.db, world.rt),
      given(world.episode.id, { observed: at(NOW - HOUR_MS), amends: { id: first.id, reason: 'wrong hour' } }),
    )
    expect(airwayOf(world)).toMatchObject({ airway: 'tracheostomy', version: 2 })
    expect(auditRows(world.db, 'airway.amend')).toHaveLength(1)
  })

  it('does not correct the beginning of ventilation', () => {
    const world = makeWorld()
    const begin = world.db.select().from(airwayEvents).get()
    const input = given(world.episode.id, { amends: { id: begin?.id ?? '', reason: 'wrong hour' } })
    expectRefusal(() => recordAirway(makeCtx(world.db, world.rt), input), 'PRECONDITION')
  })

  it('refuses a unit lead and a person from another unit', () => {
    const world = makeWorld()
    expectDoor(world, recordAirway, given(world.episode.id), world.lead)
  })

  it('leaves nothing behind when the audit row cannot be written', () => {
    const world = makeWorld()
    expectNothingLeft(makeCtx(world.db, world.rt), recordAirway, given(world.episode.id), 'airway.record')
  })

  it('records a request that arrives twice once', () => {
    const world = makeWorld()
    expectOnce(world.db, world.rt, recordAirway, given(world.episode.id), given(world.episode.id, { reason: 'Other' }))
  })

  it('answers through its route', async () => {
    const world = makeWorld()
    serveDatabase(world.db)
    world.db.$client.prepare('update episodes set started_at = ?').run(Date.now() - 5 * HOUR_MS)
    const { cookie } = makeSession(world.db, world.rt.id)
    const { episodeId, ...body } = given(world.episode.id, { observed: at(Date.now() - MINUTE_MS) })
    expect((await POST(makeRequest('/api/x', { body, cookie }), routeParams({ episodeId }))).status).toBe(200)
    expect(
      (await POST(makeRequest('/api/x', { body: { ...body, event: 'extubated' }, cookie }), routeParams({ episodeId }))).status,
    ).toBe(422)
  })
})
