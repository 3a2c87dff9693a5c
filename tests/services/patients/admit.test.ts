import { eq } from 'drizzle-orm'
import { describe, expect, it } from 'vitest'
import { GET, POST } from '@/app/api/units/[unitId]/patients/route'
import { beds, patients, stays } from '@/db/schema'
import { admitPatientSchema, type AdmitPatientInput } from '@/lib/schemas/patients'
import { admitPatient } from '@/lib/services/patients/admit'
import { HOUR_MS, MINUTE_MS } from '@/lib/shared/time'
import { auditRows, makeCtx, makePatient, makePerson, makeStay, makeWorld, NOW } from '../../helpers/factories'
import { makeRequest, makeSession, routeParams, serveDatabase } from '../../helpers/test-server'
import { at, expectDoor, expectNothingLeft, expectOnce, expectRefusal, refusalOf } from '../../helpers/verb-checks'

type World = ReturnType<typeof makeWorld>
const bedId = (world: World, index: number) => world.medical.beds[index]?.id ?? ''

const given = (world: World, over: Partial<AdmitPatientInput> = {}): AdmitPatientInput => ({
  unitId: world.medical.unit.id,
  bedId: bedId(world, 1),
  observed: at(NOW - HOUR_MS),
  recordNumber: 'KR 100',
  familyName: 'Okafor',
  givenName: 'Sam',
  birthDate: '1970-02-01',
  sex: 'female',
  heightCm: 165,
  weightKg: 70,
  ...over,
})
/** A patient who was here and has left. */
function addFormer(world: World, over: Partial<typeof patients.$inferInsert> = {}) {
  const former = makePatient(world.db, world.hospital.id, world.rt.id, {
    recordNumber: 'KR 100',
    familyName: 'Okafor',
    givenName: 'Sam',
    birthDate: '1970-02-01',
    sex: 'female',
    heightCm: 165,
    weightKg: 82,
    ...over,
  })
  makeStay(world.db, {
    patientId: former.id,
    unitId: world.surgical.unit.id,
    bedId: world.surgical.beds[0]?.id ?? '',
    endedAt: NOW - 5 * HOUR_MS,
    end: 'left_unit',
  })
  return former
}

describe('admitPatient', () => {
  it('keeps who the patient is and the stay, with one audit row', () => {
    const world = makeWorld()
    const answer = admitPatient(makeCtx(world.db, world.nurse), given(world))
    expect(answer.isReadmission).toBe(false)
    expect(world.db.select().from(patients).where(eq(patients.id, answer.patientId)).get()).toMatchObject({
      hospitalId: world.hospital.id,
      recordNumber: 'KR 100',
      familyName: 'Okafor',
      givenName: 'Sam',
      birthDate: '1970-02-01',
      sex: 'female',
      heightCm: 165,
      weightKg: 70,
      createdBy: world.nurse.id,
      createdAt: NOW,
    })
    expect(world.db.select().from(stays).where(eq(stays.id, answer.stayId)).get()).toMatchObject({
      patientId: answer.patientId,
      unitId: world.medical.unit.id,
      bedId: bedId(world, 1),
      startedAt: NOW - HOUR_MS,
      endedAt: null,
    })
    expect(auditRows(world.db, 'patient.admit')).toMatchObject([{ subjectId: answer.patientId, actorId: world.nurse.id }])
  })

  it('takes what is not known as not known', () => {
    const world = makeWorld()
    const { patientId } = admitPatient(
      makeCtx(world.db, world.rt),
      given(world, { birthDate: null, sex: null, heightCm: null, weightKg: null }),
    )
    expect(world.db.select().from(patients).where(eq(patients.id, patientId)).get()).toMatchObject({
      birthDate: null,
      sex: null,
      heightCm: null,
      weightKg: null,
    })
  })

  it('refuses a bed that is taken without naming the patient in it', () => {
    const world = makeWorld()
    const refusal = refusalOf(() => admitPatient(makeCtx(world.db, world.rt), given(world, { bedId: world.bed.id })))
    expect(refusal.fields).toEqual({ bedId: 'Bed M01 is taken. Choose a free bed.' })
    expect(JSON.stringify([refusal.message, refusal.fields])).not.toContain(world.patient.familyName)
    expect(world.db.select().from(patients).all()).toHaveLength(1)
  })

  it('refuses a retired bed and a bed of another unit', () => {
    const world = makeWorld()
    const ctx = makeCtx(world.db, world.rt)
    world.db
      .update(beds)
      .set({ retiredAt: NOW })
      .where(eq(beds.id, bedId(world, 1)))
      .run()
    expectRefusal(() => admitPatient(ctx, given(world)), 'INVALID', 'bedId')
    expectRefusal(() => admitPatient(ctx, given(world, { bedId: world.surgical.beds[0]?.id ?? '' })), 'INVALID', 'bedId')
  })

  it('refuses the future, and a date of birth in the future or of more than 120 years ago', () => {
    const world = makeWorld()
    const ctx = makeCtx(world.db, world.rt)
    expectRefusal(() => admitPatient(ctx, given(world, { observed: at(NOW + HOUR_MS) })), 'INVALID', 'observed.time', /future/)
    expectRefusal(() => admitPatient(ctx, given(world, { birthDate: '2026-03-04' })), 'INVALID', 'birthDate', /future/)
    expectRefusal(() => admitPatient(ctx, given(world, { birthDate: '1904-01-01' })), 'INVALID', 'birthDate', /122 years/)
  })

  it('refuses a unit lead and a person from another unit', () => {
    const world = makeWorld()
    expectDoor(world, admitPatient, given(world), world.lead)
  })

  it('refuses an administrator without a role in the unit', () => {
    const world = makeWorld()
    expectRefusal(() => admitPatient(makeCtx(world.db, world.administrator), given(world)), 'NOT_FOUND')
  })

  it('leaves nothing behind when the audit row cannot be written', () => {
    const world = makeWorld()
    expectNothingLeft(makeCtx(world.db, world.rt), admitPatient, given(world), 'patient.admit')
  })

  it('admits once for a request that arrives twice', () => {
    const world = makeWorld()
    expectOnce(world.db, world.rt, admitPatient, given(world), given(world, { givenName: 'Sami' }))
    expect(world.db.select().from(patients).all()).toHaveLength(2)
  })

  it('answers through its routes', async () => {
    const world = makeWorld()
    serveDatabase(world.db)
    const { cookie } = makeSession(world.db, world.rt.id)
    const { unitId, ...body } = given(world, { observed: at(Date.now() - MINUTE_MS), recordNumber: ' kr  100 ' })
    expect((await POST(makeRequest('/api/x', { body, cookie }), routeParams({ unitId }))).status).toBe(200)
    const list = await GET(makeRequest('/api/x', { method: 'GET', cookie }), routeParams({ unitId }))
    expect(await list.json()).toMatchObject({ patients: [{ bedLabel: 'M01' }, { bedLabel: 'M02', recordNumber: 'KR 100' }] })
  })
})

describe('readmission by record number', () => {
  it('finds the patient again, keeps one record, and brings weight and height up to date', () => {
    const world = makeWorld()
    const former = addFormer(world)
    const answer = admitPatient(
      makeCtx(world.db, world.rt),
      given(world, { familyName: 'OKAFOR ', heightCm: null, birthDate: null }),
    )
    expect(answer).toMatchObject({ patientId: former.id, isReadmission: true })
    expect(world.db.select().from(patients).where(eq(patients.id, former.id)).get()).toMatchObject({
      familyName: 'Okafor',
      weightKg: 70,
      heightCm: 165,
      birthDate: '1970-02-01',
      version: 2,
    })
    expect(auditRows(world.db, 'patient.readmit')).toMatchObject([{ before: { weightKg: 82 } }])
  })

  it.each([
    ['another name', { givenName: 'Alex' }, 'recordNumber'],
    ['another date of birth', { birthDate: '1970-01-02' }, 'birthDate'],
    ['the other sex', { sex: 'male' as const }, 'sex'],
  ])('refuses %s at the field and shows nothing of the record', (_what, over, field) => {
    const world = makeWorld()
    addFormer(world, { familyName: 'Okafor', givenName: 'Sam' })
    const refusal = refusalOf(() => admitPatient(makeCtx(world.db, world.rt), given(world, over)))
    expect(refusal.code).toBe('CONFLICT')
    expect(Object.keys(refusal.fields ?? {})).toEqual([field])
    expect(JSON.stringify([refusal.message, refusal.fields])).not.toMatch(/Okafor|Sam|1970-02-01/)
  })

  it('refuses a patient who lies in a bed: here, or in another unit', () => {
    const world = makeWorld()
    const { recordNumber, familyName, givenName, birthDate, sex } = world.patient
    const same = { recordNumber, familyName, givenName, birthDate, sex }
    expectRefusal(
      () => admitPatient(makeCtx(world.db, world.rt), given(world, same)),
      'CONFLICT',
      'recordNumber',
      /bed of this unit/,
    )
    const other = { ...given(world, same), unitId: world.surgical.unit.id, bedId: world.surgical.beds[0]?.id ?? '' }
    expectRefusal(() => admitPatient(makeCtx(world.db, world.outsider), other), 'CONFLICT', 'recordNumber', /another unit/)
  })

  it('refuses a time before the last stay ended', () => {
    const world = makeWorld()
    addFormer(world)
    expectRefusal(
      () => admitPatient(makeCtx(world.db, world.rt), given(world, { observed: at(NOW - 6 * HOUR_MS) })),
      'INVALID',
      'observed.time',
      /left the last bed at 03:00/,
    )
  })

  it('takes the same record number in another hospital as another patient', () => {
    const world = makeWorld()
    addFormer(world)
    const elsewhere = makeWorld(world.db)
    const stranger = makePerson(world.db, elsewhere.hospital.id, [{ unitId: elsewhere.medical.unit.id, role: 'rt' }])
    const input = { ...given(elsewhere), familyName: 'Lindqvist' }
    expect(admitPatient(makeCtx(world.db, stranger), input).isReadmission).toBe(false)
  })
})

describe('what the admission form refuses', () => {
  const world = makeWorld()
  it.each([
    ['recordNumber', '  ', /Give the record number/],
    ['familyName', '', /family name/],
    ['birthDate', '1.2.1970', /year-month-day/],
    ['birthDate', '1970-02-30', /does not exist/],
    ['heightCm', 1.65, /165 cm\?/],
    ['heightCm', 66, /inches.*168 cm\?/],
    ['weightKg', 8, /between 20 and 400/],
    ['weightKg', 230, /Look again, then confirm/],
    ['sex', 'other', /sex/],
    ['bedId', '', /bed/],
  ])('%s of %s', (field, value, words) => {
    const parsed = admitPatientSchema.safeParse({ ...given(world), [field]: value })
    expect(parsed.error?.issues.map((issue) => issue.path.join('.'))).toContain(field)
    expect(parsed.error?.issues.find((issue) => issue.path.join('.') === field)?.message).toMatch(words)
  })
})
