import { describe, expect, it } from 'vitest'
import { episodes } from '@/db/schema'
import { listPatients } from '@/lib/services/patients/list'
import { HOUR_MS } from '@/lib/shared/time'
import { makeCtx, makePatient, makeStay, makeWorld, NOW } from '../../helpers/factories'
import { expectDoor } from '../../helpers/verb-checks'

describe('listPatients', () => {
  it('lists everybody in the unit in bed order, ventilated or not, and the free beds', () => {
    const world = makeWorld()
    const other = makePatient(world.db, world.hospital.id, world.rt.id, { birthDate: null })
    makeStay(world.db, { patientId: other.id, unitId: world.medical.unit.id, bedId: world.medical.beds[2]?.id ?? '' })
    const list = listPatients(makeCtx(world.db, world.rt), { unitId: world.medical.unit.id })
    expect(list.patients).toMatchObject([
      {
        patientId: world.patient.id,
        bedLabel: 'M01',
        ageYears: 64,
        episode: { id: world.episode.id, ventilatorDayNumber: 3 },
        lastEndedAt: null,
      },
      { patientId: other.id, bedLabel: 'M03', ageYears: null, episode: null },
    ])
    expect(list.freeBeds.map((bed) => bed.label)).toEqual(['M02', 'M04'])
    expect(list.mayAdmit).toBe(true)
  })

  it('leaves out who has left, and tells when ventilation ended', () => {
    const world = makeWorld()
    world.db
      .update(episodes)
      .set({ endedAt: NOW - HOUR_MS, end: 'extubated' })
      .run()
    const read = () => listPatients(makeCtx(world.db, world.lead), { unitId: world.medical.unit.id })
    expect(read().patients).toMatchObject([{ episode: null, lastEndedAt: NOW - HOUR_MS }])
    expect(read().mayAdmit).toBe(false)
    world.db.$client.prepare("update stays set ended_at = ?, end = 'left_unit'").run(NOW)
    expect(read().patients).toEqual([])
  })

  it('does not show a unit to people of another one, nor to an administrator', () => {
    const world = makeWorld()
    expectDoor(world, listPatients, { unitId: world.medical.unit.id }, null)
    expectDoor({ db: world.db, outsider: world.administrator }, listPatients, { unitId: world.medical.unit.id }, null)
  })
})
