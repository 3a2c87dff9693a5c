import { describe, expect, it } from 'vitest'
import { POST } from '@/app/api/patients/[patientId]/end-stay/route'
import { episodes, stays } from '@/db/schema'
import type { EndStayInput } from '@/lib/schemas/stays'
import { endStay } from '@/lib/services/stays/end'
import { HOUR_MS, MINUTE_MS } from '@/lib/shared/time'
import { auditRows, makeCtx, makeWorld, NOW } from '../../helpers/factories'
import { makeRequest, makeSession, routeParams, serveDatabase } from '../../helpers/test-server'
import { at, expectDoor, expectNothingLeft, expectOnce, expectRefusal } from '../../helpers/verb-checks'

/** The world's patient, extubated three hours ago. */
function makeExtubated() {
  const world = makeWorld()
  world.db
    .update(episodes)
    .set({ endedAt: NOW - 3 * HOUR_MS, end: 'extubated' })
    .run()
  return world
}
const given = (world: ReturnType<typeof makeWorld>, over: Partial<EndStayInput> = {}): EndStayInput => ({
  patientId: world.patient.id,
  stayId: world.stay.id,
  end: 'left_unit',
  observed: at(NOW - HOUR_MS),
  ...over,
})

describe('endStay', () => {
  it('ends the stay with its audit row, and frees the bed', () => {
    const world = makeExtubated()
    endStay(makeCtx(world.db, world.nurse), given(world))
    expect(world.db.select().from(stays).all()).toMatchObject([{ endedAt: NOW - HOUR_MS, end: 'left_unit', version: 2 }])
    expect(auditRows(world.db, 'stay.end')).toMatchObject([{ subjectId: world.patient.id, actorId: world.nurse.id }])
  })

  it('refuses while ventilation runs', () => {
    const world = makeWorld()
    expectRefusal(
      () => endStay(makeCtx(world.db, world.nurse), given(world, { end: 'died' })),
      'PRECONDITION',
      undefined,
      /Ventilation still runs/,
    )
    expect(world.db.select().from(stays).get()?.endedAt).toBeNull()
  })

  it('refuses the future, and a time before ventilation ended', () => {
    const world = makeExtubated()
    const end = (ms: number) => () => endStay(makeCtx(world.db, world.nurse), given(world, { observed: at(ms) }))
    expectRefusal(end(NOW + HOUR_MS), 'INVALID', 'observed.time', /future/)
    expectRefusal(end(NOW - 4 * HOUR_MS), 'INVALID', 'observed.time', /Ventilation ended at 05:00/)
  })

  it('refuses a second end and a stay that is not the present one', () => {
    const world = makeExtubated()
    const ctx = makeCtx(world.db, world.nurse)
    expectRefusal(() => endStay(ctx, given(world, { stayId: 'other' })), 'CONFLICT')
    endStay(ctx, given(world))
    expectRefusal(() => endStay(ctx, given(world)), 'CONFLICT')
  })

  it('refuses a unit lead and a person from another unit', () => {
    const world = makeExtubated()
    expectDoor(world, endStay, given(world), world.lead)
  })

  it('leaves nothing behind when the audit row cannot be written', () => {
    const world = makeExtubated()
    expectNothingLeft(makeCtx(world.db, world.rt), endStay, given(world), 'stay.end')
  })

  it('ends once for a request that arrives twice', () => {
    const world = makeExtubated()
    expectOnce(world.db, world.rt, endStay, given(world), given(world, { end: 'died' }))
  })

  it('answers through its route', async () => {
    const world = makeExtubated()
    serveDatabase(world.db)
    const { cookie } = makeSession(world.db, world.rt.id)
    const { patientId, ...body } = given(world, { observed: at(Date.now() - MINUTE_MS) })
    expect(
      (await POST(makeRequest('/api/x', { body: { ...body, end: 'moved' }, cookie }), routeParams({ patientId }))).status,
    ).toBe(422)
    expect((await POST(makeRequest('/api/x', { body, cookie }), routeParams({ patientId }))).status).toBe(200)
  })
})
