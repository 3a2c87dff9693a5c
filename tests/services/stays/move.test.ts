import { eq } from 'drizzle-orm'
import { describe, expect, it } from 'vitest'
import { GET, POST } from '@/app/api/patients/[patientId]/move/route'
import { beds, stays, units } from '@/db/schema'
import type { MoveStayInput } from '@/lib/schemas/stays'
import { moveStay } from '@/lib/services/stays/move'
import { readMoveForm } from '@/lib/services/stays/read-move-form'
import { listToday } from '@/lib/services/today/list'
import { HOUR_MS, MINUTE_MS } from '@/lib/shared/time'
import { auditRows, makeCtx, makeHospital, makePatient, makeStay, makeUnit, makeWorld, NOW } from '../../helpers/factories'
import { makeRequest, makeSession, routeParams, serveDatabase } from '../../helpers/test-server'
import { at, expectDoor, expectNothingLeft, expectOnce, expectRefusal } from '../../helpers/verb-checks'

type World = ReturnType<typeof makeWorld>
const bedOf = (place: { beds: { id: string; label: string }[] }, index: number) => {
  const bed = place.beds[index]
  if (!bed) throw new Error('no bed')
  return bed
}
const given = (world: World, over: Partial<MoveStayInput> = {}): MoveStayInput => ({
  patientId: world.patient.id,
  stayId: world.stay.id,
  unitId: world.medical.unit.id,
  bedId: bedOf(world.medical, 1).id,
  observed: at(NOW - HOUR_MS),
  ...over,
})
const staysOf = (world: World) =>
  world.db.select().from(stays).where(eq(stays.patientId, world.patient.id)).orderBy(stays.startedAt).all()

describe('moveStay', () => {
  it('ends one stay and begins the next at the same moment, with the audit row', () => {
    const world = makeWorld()
    const { stayId } = moveStay(makeCtx(world.db, world.nurse), given(world))
    expect(staysOf(world)).toMatchObject([
      { id: world.stay.id, endedAt: NOW - HOUR_MS, end: 'moved', version: 2 },
      { id: stayId, bedId: bedOf(world.medical, 1).id, startedAt: NOW - HOUR_MS, endedAt: null },
    ])
    expect(auditRows(world.db, 'stay.move')).toMatchObject([{ subjectId: world.patient.id, unitId: world.medical.unit.id }])
  })

  it('moves to another unit: from then on the patient is the other unit’s', () => {
    const world = makeWorld()
    moveStay(makeCtx(world.db, world.rt), given(world, { unitId: world.surgical.unit.id, bedId: bedOf(world.surgical, 0).id }))
    expect(
      listToday(makeCtx(world.db, world.outsider), { unitId: world.surgical.unit.id }).rows.map((row) => row.patientId),
    ).toEqual([world.patient.id])
    expect(listToday(makeCtx(world.db, world.rt), { unitId: world.medical.unit.id }).rows).toEqual([])
  })

  it('refuses a bed that is taken, and does not say by whom', () => {
    const world = makeWorld()
    const other = makePatient(world.db, world.hospital.id, world.rt.id)
    makeStay(world.db, { patientId: other.id, unitId: world.medical.unit.id, bedId: bedOf(world.medical, 1).id })
    const move = () => moveStay(makeCtx(world.db, world.rt), given(world))
    expectRefusal(move, 'INVALID', 'bedId', /^Bed M02 is taken\. Choose a free bed\.$/)
    expect(staysOf(world)).toHaveLength(1)
  })

  it('refuses a bed that somebody lay in at that time', () => {
    const world = makeWorld()
    const other = makePatient(world.db, world.hospital.id, world.rt.id)
    makeStay(world.db, {
      patientId: other.id,
      unitId: world.medical.unit.id,
      bedId: bedOf(world.medical, 1).id,
      endedAt: NOW - 30 * MINUTE_MS,
      end: 'left_unit',
    })
    const ctx = makeCtx(world.db, world.rt)
    expectRefusal(() => moveStay(ctx, given(world)), 'INVALID', 'bedId', /taken until 07:30/)
    expect(moveStay(ctx, given(world, { observed: at(NOW - 30 * MINUTE_MS) })).stayId).toBeTruthy()
  })

  it('refuses the present bed, a bed of another unit, a retired bed, and a unit of another hospital', () => {
    const world = makeWorld()
    const ctx = makeCtx(world.db, world.rt)
    const elsewhere = makeUnit(world.db, makeHospital(world.db).id)
    expectRefusal(() => moveStay(ctx, given(world, { bedId: world.bed.id })), 'INVALID', 'bedId', /in this bed already/)
    expectRefusal(
      () => moveStay(ctx, given(world, { bedId: bedOf(world.surgical, 0).id })),
      'INVALID',
      'bedId',
      /not in use in this unit/,
    )
    expectRefusal(
      () => moveStay(ctx, given(world, { unitId: elsewhere.unit.id, bedId: bedOf(elsewhere, 0).id })),
      'INVALID',
      'unitId',
    )
    world.db
      .update(beds)
      .set({ retiredAt: NOW })
      .where(eq(beds.id, bedOf(world.medical, 1).id))
      .run()
    expectRefusal(() => moveStay(ctx, given(world)), 'INVALID', 'bedId', /not in use/)
    world.db.update(units).set({ retiredAt: NOW }).where(eq(units.id, world.surgical.unit.id)).run()
    expectRefusal(
      () => moveStay(ctx, given(world, { unitId: world.surgical.unit.id, bedId: bedOf(world.surgical, 0).id })),
      'INVALID',
      'unitId',
    )
  })

  it('refuses the future and a time before the present stay', () => {
    const world = makeWorld()
    const move = (ms: number) => () => moveStay(makeCtx(world.db, world.rt), given(world, { observed: at(ms) }))
    expectRefusal(move(NOW + HOUR_MS), 'INVALID', 'observed.time', /future/)
    expectRefusal(move(world.stay.startedAt), 'INVALID', 'observed.time', /in this bed since/)
  })

  it('refuses the second of two people who move the same patient', () => {
    const world = makeWorld()
    moveStay(makeCtx(world.db, world.nurse), given(world))
    expectRefusal(() => moveStay(makeCtx(world.db, world.rt), given(world, { bedId: bedOf(world.medical, 2).id })), 'CONFLICT')
    expect(staysOf(world)).toHaveLength(2)
  })

  it('refuses a unit lead and a person from another unit', () => {
    const world = makeWorld()
    expectDoor(world, moveStay, given(world), world.lead)
  })

  it('leaves nothing behind when the audit row cannot be written', () => {
    const world = makeWorld()
    expectNothingLeft(makeCtx(world.db, world.rt), moveStay, given(world), 'stay.move')
  })

  it('moves once for a request that arrives twice', () => {
    const world = makeWorld()
    expectOnce(world.db, world.rt, moveStay, given(world), given(world, { bedId: bedOf(world.medical, 2).id }))
  })

  it('answers through its route', async () => {
    const world = makeWorld()
    serveDatabase(world.db)
    const { cookie } = makeSession(world.db, world.rt.id)
    const { patientId, ...body } = given(world, { observed: at(Date.now() - MINUTE_MS) })
    const form = await GET(makeRequest('/api/x', { method: 'GET', cookie }), routeParams({ patientId }))
    expect(await form.json()).toMatchObject({ stay: { id: world.stay.id, bedLabel: 'M01' } })
    expect((await POST(makeRequest('/api/x', { body, cookie }), routeParams({ patientId }))).status).toBe(200)
    expect((await POST(makeRequest('/api/x', { body, cookie }), routeParams({ patientId }))).status).toBe(409)
  })
})

describe('readMoveForm', () => {
  it('lists the free beds of every unit of the hospital, without any patient', () => {
    const world = makeWorld()
    const form = readMoveForm(makeCtx(world.db, world.rt), { patientId: world.patient.id })
    expect(form.units.map((unit) => [unit.name, unit.freeBeds.map((bed) => bed.label)])).toEqual([
      ['Medical ICU', ['M02', 'M03', 'M04']],
      ['Surgical ICU', ['S01', 'S02', 'S03', 'S04']],
    ])
    expect(form.stay).toMatchObject({ id: world.stay.id, unitId: world.medical.unit.id, bedLabel: 'M01' })
  })

  it('refuses a unit lead and a person from another unit', () => {
    const world = makeWorld()
    expectDoor(world, readMoveForm, { patientId: world.patient.id }, world.lead)
  })
})
