import { eq } from 'drizzle-orm'
import { beforeEach, describe, expect, it } from 'vitest'
import type { Db } from '@/db/client'
import { beds, hospitals, mailSchedules, protocolVersions, units } from '@/db/schema'
import { updateHospitalSchema } from '@/lib/schemas/hospital'
import { createUnitSchema, isTimeZone, updateUnitSchema, type CreateUnitInput } from '@/lib/schemas/units'
import { readHospital } from '@/lib/services/hospital/read'
import { updateHospital } from '@/lib/services/hospital/update'
import { addBeds } from '@/lib/services/units/add-beds'
import { createUnit } from '@/lib/services/units/create'
import { listUnitsForAdmin } from '@/lib/services/units/list'
import { retireBed } from '@/lib/services/units/retire-bed'
import { updateUnit } from '@/lib/services/units/update'
import { AppError } from '@/lib/shared/errors'
import { defaultProtocol } from '@/lib/weaning/published/default-protocol'
import { auditRows, makeCtx, makeHospital, makeUnit, makeWorld, NOW } from '../../helpers/factories'

let db: Db
let world: ReturnType<typeof makeWorld>
let foreign: ReturnType<typeof makeUnit>

beforeEach(() => {
  world = makeWorld()
  db = world.db
  foreign = makeUnit(db, makeHospital(db).id)
})

const asAdministrator = (key: string | null = null) => makeCtx(db, world.administrator, NOW, { idempotencyKey: key })
const refusalOf = (run: () => unknown): AppError | null => {
  try {
    run()
    return null
  } catch (error) {
    if (error instanceof AppError) return error
    throw error
  }
}
const newUnit = (over: Partial<CreateUnitInput> = {}): CreateUnitInput => ({
  name: 'Cardiac ICU',
  timeZone: 'America/Denver',
  altitudeM: 1450,
  barometricPressureMmHg: null,
  bedLabels: ['C01', 'C02'],
  ...over,
})
const changeOf = (unit: { id: string }, over: object = {}) => ({
  unitId: unit.id,
  version: 1,
  name: 'Renamed',
  timeZone: 'America/Denver',
  altitudeM: 0,
  barometricPressureMmHg: null,
  dayTrackFromHour: 4,
  dayTrackToHour: 20,
  ...over,
})

describe('who may manage units and the hospital', () => {
  const verbs: [string, (ctx: ReturnType<typeof makeCtx>) => unknown][] = [
    ['list units', (ctx) => listUnitsForAdmin(ctx)],
    ['create a unit', (ctx) => createUnit(ctx, newUnit())],
    ['change a unit', (ctx) => updateUnit(ctx, changeOf(world.medical.unit))],
    ['add beds', (ctx) => addBeds(ctx, { unitId: world.medical.unit.id, bedLabels: ['X1'] })],
    ['retire a bed', (ctx) => retireBed(ctx, { bedId: world.medical.beds[1]?.id ?? '' })],
    ['read the hospital', (ctx) => readHospital(ctx)],
    ['change the hospital', (ctx) => updateHospital(ctx, { name: 'X', idleLockMin: 5, version: 1 })],
  ]
  it.each(verbs)('refuses to %s as anybody but an administrator, and changes nothing', (_name, verb) => {
    const before = [db.select().from(units).all(), db.select().from(beds).all(), db.select().from(hospitals).all()]
    for (const person of [world.rt, world.nurse, world.physician, world.lead]) {
      expect(refusalOf(() => verb(makeCtx(db, person)))?.code).toBe('FORBIDDEN')
    }
    expect([db.select().from(units).all(), db.select().from(beds).all(), db.select().from(hospitals).all()]).toEqual(before)
    expect(auditRows(db, 'access.denied')).toHaveLength(4)
  })

  it('does not find units and beds of another hospital', () => {
    expect(refusalOf(() => updateUnit(asAdministrator(), changeOf(foreign.unit)))?.code).toBe('NOT_FOUND')
    expect(refusalOf(() => addBeds(asAdministrator(), { unitId: foreign.unit.id, bedLabels: ['X1'] }))?.code).toBe('NOT_FOUND')
    expect(refusalOf(() => retireBed(asAdministrator(), { bedId: foreign.beds[0]?.id ?? '' }))?.code).toBe('NOT_FOUND')
    expect(JSON.stringify(listUnitsForAdmin(asAdministrator()))).not.toContain(foreign.unit.id)
  })

  it('shows an administrator no patient and not which bed is taken', () => {
    const listed = listUnitsForAdmin(asAdministrator())
    const text = JSON.stringify(listed)
    for (const secret of [world.patient.id, world.patient.familyName, world.patient.recordNumber, world.stay.id])
      expect(text).not.toContain(secret)
    const bedKeys = new Set(listed.units.flatMap((unit) => unit.beds).flatMap((bed) => Object.keys(bed)))
    expect([...bedKeys].sort()).toEqual(['id', 'isRetired', 'label'])
  })
})

describe('creating a unit', () => {
  it('brings beds in order, the default protocol in force from now, the mail schedule and an audit row', () => {
    const unit = createUnit(asAdministrator(), newUnit())
    expect(unit).toMatchObject({ name: 'Cardiac ICU', altitudeM: 1450, version: 1, dayTrackFromHour: 4, dayTrackToHour: 20 })
    expect(unit.beds.map((bed) => bed.label)).toEqual(['C01', 'C02'])
    expect(db.select().from(protocolVersions).where(eq(protocolVersions.unitId, unit.id)).all()).toMatchObject([
      { number: 1, isDefault: true, startsAt: NOW, draftedBy: null, approvedAt: null, content: defaultProtocol },
    ])
    expect(db.select().from(mailSchedules).where(eq(mailSchedules.unitId, unit.id)).all()).toEqual([
      {
        unitId: unit.id,
        morningDueMin: defaultProtocol.screeningWindow.opensMin,
        isWindowEndOn: true,
        isDecisionOwedOn: true,
        version: 1,
      },
    ])
    expect(auditRows(db, 'unit.create').map((row) => [row.unitId, row.actorId])).toEqual([[unit.id, world.administrator.id]])
  })

  it('creates one unit when the same request comes twice', () => {
    const first = createUnit(asAdministrator('key'), newUnit())
    expect(createUnit(asAdministrator('key'), newUnit())).toEqual(first)
    expect(db.select().from(units).where(eq(units.name, 'Cardiac ICU')).all()).toHaveLength(1)
  })

  it('refuses what cannot be: a time zone, an altitude, a pressure in hPa, the same bed twice', () => {
    const pathsOf = (over: object) => createUnitSchema.safeParse(newUnit(over)).error?.issues.map((issue) => issue.path.join('.'))
    expect(pathsOf({ timeZone: 'Mountain time' })).toEqual(['timeZone'])
    expect(pathsOf({ timeZone: '+07:00' })).toEqual(['timeZone'])
    expect(pathsOf({ altitudeM: 5201 })).toEqual(['altitudeM'])
    expect(pathsOf({ altitudeM: -451 })).toEqual(['altitudeM'])
    expect(pathsOf({ altitudeM: Number.NaN })).toEqual(['altitudeM'])
    expect(pathsOf({ barometricPressureMmHg: 1013 })).toEqual(['barometricPressureMmHg'])
    expect(pathsOf({ barometricPressureMmHg: 101 })).toEqual(['barometricPressureMmHg'])
    expect(pathsOf({ bedLabels: ['C01', 'c01'] })).toEqual(['bedLabels'])
    expect(pathsOf({ name: ' ' })).toEqual(['name'])
    expect(pathsOf({ barometricPressureMmHg: 640, altitudeM: 0, bedLabels: [] })).toBeUndefined()
  })

  it.each(['UTC', 'America/Denver', 'Europe/Berlin', 'America/Argentina/Buenos_Aires', 'Asia/Kathmandu'])(
    'knows the time zone %s',
    (zone) => {
      expect(isTimeZone(zone)).toBe(true)
    },
  )
})

describe('changing a unit', () => {
  it('changes name, place and day track, with before and after in the audit log', () => {
    const unit = updateUnit(
      asAdministrator(),
      changeOf(world.surgical.unit, { altitudeM: 1450, barometricPressureMmHg: 642, dayTrackToHour: 22 }),
    )
    expect(unit).toMatchObject({ name: 'Renamed', altitudeM: 1450, barometricPressureMmHg: 642, dayTrackToHour: 22, version: 2 })
    expect(auditRows(db, 'unit.update')[0]).toMatchObject({
      before: { name: 'Surgical ICU' },
      after: { name: 'Renamed' },
      unitId: world.surgical.unit.id,
    })
  })

  it('refuses a stale version', () => {
    updateUnit(asAdministrator(), changeOf(world.surgical.unit))
    expect(refusalOf(() => updateUnit(asAdministrator(), changeOf(world.surgical.unit, { name: 'Late' })))?.code).toBe('CONFLICT')
    expect(db.select().from(units).where(eq(units.id, world.surgical.unit.id)).get()?.name).toBe('Renamed')
  })

  it('keeps the time zone of a unit that has had a patient, and lets an unused one change it', () => {
    const used = refusalOf(() => updateUnit(asAdministrator(), changeOf(world.medical.unit, { timeZone: 'Europe/Berlin' })))
    expect(used?.fields).toHaveProperty('timeZone')
    expect(updateUnit(asAdministrator(), changeOf(world.surgical.unit, { timeZone: 'Europe/Berlin' })).timeZone).toBe(
      'Europe/Berlin',
    )
  })

  it('asks for a day track of at least four hours', () => {
    const parse = (over: object) => updateUnitSchema.safeParse(changeOf(world.medical.unit, over)).success
    expect([
      parse({ dayTrackFromHour: 16, dayTrackToHour: 20 }),
      parse({ dayTrackFromHour: 17, dayTrackToHour: 20 }),
      parse({ dayTrackToHour: 25 }),
    ]).toEqual([true, false, false])
  })
})

describe('beds', () => {
  it('come after those that are there, with an audit row', () => {
    const unit = addBeds(asAdministrator(), { unitId: world.medical.unit.id, bedLabels: ['Z9', 'A1'] })
    expect(unit.beds.map((bed) => bed.label)).toEqual(['M01', 'M02', 'M03', 'M04', 'Z9', 'A1'])
    expect(auditRows(db, 'bed.add').map((row) => row.after)).toEqual([{ labels: ['Z9', 'A1'] }])
  })

  it('are refused when the label is in use, and then none is added', () => {
    const refusal = refusalOf(() => addBeds(asAdministrator(), { unitId: world.medical.unit.id, bedLabels: ['N1', 'm01'] }))
    expect(refusal?.fields).toEqual({ bedLabels: 'Bed M01 exists already in this unit.' })
    expect(db.select().from(beds).where(eq(beds.label, 'N1')).all()).toEqual([])
  })

  it('can be taken out of use when empty, and come back by their label as the same bed', () => {
    const bed = world.medical.beds[1]
    const bedId = bed?.id ?? ''
    expect(retireBed(asAdministrator(), { bedId }).beds.find((one) => one.id === bedId)?.isRetired).toBe(true)
    expect(refusalOf(() => retireBed(asAdministrator(), { bedId }))?.code).toBe('PRECONDITION')
    const back = addBeds(asAdministrator(), { unitId: world.medical.unit.id, bedLabels: [bed?.label ?? ''] })
    expect(back.beds.find((one) => one.id === bedId)?.isRetired).toBe(false)
    expect(back.beds).toHaveLength(4)
    expect(auditRows(db, 'bed.retire').map((row) => row.subjectId)).toEqual([bedId])
  })

  it('stay in use while a patient lies there', () => {
    expect(refusalOf(() => retireBed(asAdministrator(), { bedId: world.bed.id }))?.code).toBe('PRECONDITION')
    expect(db.select().from(beds).where(eq(beds.id, world.bed.id)).get()?.retiredAt).toBeNull()
  })
})

describe('the hospital', () => {
  it('changes its name and idle lock, with an audit row; a stale version is refused', () => {
    expect(updateHospital(asAdministrator(), { name: 'Renamed Hospital', idleLockMin: 5, version: 1 })).toMatchObject({
      idleLockMin: 5,
      version: 2,
    })
    expect(readHospital(asAdministrator())).toMatchObject({ name: 'Renamed Hospital', idleLockMin: 5 })
    expect(auditRows(db, 'hospital.update')[0]).toMatchObject({ before: { idleLockMin: 15 }, after: { idleLockMin: 5 } })
    expect(refusalOf(() => updateHospital(asAdministrator(), { name: 'Late', idleLockMin: 9, version: 1 }))?.code).toBe(
      'CONFLICT',
    )
    expect(readHospital(asAdministrator()).name).toBe('Renamed Hospital')
  })

  it('locks after 1 to 240 whole minutes', () => {
    const parse = (idleLockMin: number) => updateHospitalSchema.safeParse({ name: 'X', idleLockMin, version: 1 }).success
    expect([0, 1, 240, 241, 1.5, Number.NaN].map(parse)).toEqual([false, true, true, false, false, false])
  })
})
