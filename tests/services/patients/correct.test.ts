import { eq } from 'drizzle-orm'
import { describe, expect, it } from 'vitest'
import { POST } from '@/app/api/patients/[patientId]/route'
import { patients } from '@/db/schema'
import type { CorrectPatientInput } from '@/lib/schemas/patients'
import { correctPatient } from '@/lib/services/patients/correct'
import { auditRows, makeCtx, makePatient, makeWorld } from '../../helpers/factories'
import { makeRequest, makeSession, routeParams, serveDatabase } from '../../helpers/test-server'
import { expectDoor, expectNothingLeft, expectOnce, expectRefusal } from '../../helpers/verb-checks'

const given = (world: ReturnType<typeof makeWorld>, over: Partial<CorrectPatientInput> = {}): CorrectPatientInput => ({
  patientId: world.patient.id,
  version: 1,
  recordNumber: world.patient.recordNumber,
  familyName: 'Varga',
  givenName: 'Ines',
  birthDate: '1980-07-01',
  sex: 'female',
  heightCm: 170,
  weightKg: 64,
  ...over,
})

describe('correctPatient', () => {
  it('changes the details and keeps what stood before in the audit log', () => {
    const world = makeWorld()
    expect(correctPatient(makeCtx(world.db, world.nurse), given(world))).toEqual({ version: 2 })
    expect(world.db.select().from(patients).where(eq(patients.id, world.patient.id)).get()).toMatchObject({
      familyName: 'Varga',
      heightCm: 170,
      sex: 'female',
      version: 2,
    })
    expect(auditRows(world.db, 'patient.correct')).toMatchObject([
      { before: { heightCm: 180, sex: 'male' }, after: { heightCm: 170, sex: 'female' } },
    ])
  })

  it('refuses a form that was opened before a colleague changed the details', () => {
    const world = makeWorld()
    correctPatient(makeCtx(world.db, world.nurse), given(world))
    expectRefusal(() => correctPatient(makeCtx(world.db, world.rt), given(world, { heightCm: 150 })), 'CONFLICT')
    expect(world.db.select().from(patients).where(eq(patients.id, world.patient.id)).get()?.heightCm).toBe(170)
  })

  it('refuses the record number of another patient', () => {
    const world = makeWorld()
    const other = makePatient(world.db, world.hospital.id, world.rt.id)
    expectRefusal(
      () => correctPatient(makeCtx(world.db, world.rt), given(world, { recordNumber: other.recordNumber })),
      'INVALID',
      'recordNumber',
    )
  })

  it('refuses a date of birth in the future', () => {
    const world = makeWorld()
    expectRefusal(
      () => correctPatient(makeCtx(world.db, world.rt), given(world, { birthDate: '2027-01-01' })),
      'INVALID',
      'birthDate',
    )
  })

  it('refuses a unit lead and a person from another unit', () => {
    const world = makeWorld()
    expectDoor(world, correctPatient, given(world), world.lead)
  })

  it('leaves nothing behind when the audit row cannot be written', () => {
    const world = makeWorld()
    expectNothingLeft(makeCtx(world.db, world.rt), correctPatient, given(world), 'patient.correct')
  })

  it('corrects once for a request that arrives twice', () => {
    const world = makeWorld()
    expectOnce(world.db, world.rt, correctPatient, given(world), given(world, { heightCm: 171 }))
  })

  it('answers through its route', async () => {
    const world = makeWorld()
    serveDatabase(world.db)
    const { cookie } = makeSession(world.db, world.rt.id)
    const { patientId, ...body } = given(world)
    expect((await POST(makeRequest('/api/x', { body, cookie }), routeParams({ patientId }))).status).toBe(200)
    expect((await POST(makeRequest('/api/x', { body, cookie }), routeParams({ patientId }))).status).toBe(409)
  })
})
