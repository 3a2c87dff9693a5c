import { beforeEach, describe, expect, it } from 'vitest'
import { POST } from '@/app/api/openings/route'
import { GET } from '@/app/api/units/[unitId]/openings/route'
import { mailLedger, patients, recordOpenings } from '@/db/schema'
import { openRecord } from '@/lib/services/openings/open'
import { listOpenings } from '@/lib/services/openings/list'
import { readPatient } from '@/lib/services/patients/read'
import { recordSettings } from '@/lib/services/settings/record'
import { HOUR_MS } from '@/lib/shared/time'
import { auditRows, makeCtx, makePatient, makePerson, makeWorld, NOW } from '../../helpers/factories'
import { makeRequest, makeSession, routeParams, serveDatabase } from '../../helpers/test-server'
import { at, expectDoor, expectNothingLeft, expectOnce, expectRefusal } from '../../helpers/verb-checks'

const REASON = 'Consult for difficult airway'
let world: ReturnType<typeof makeWorld>
beforeEach(() => {
  world = makeWorld()
  serveDatabase(world.db)
})
const given = (over: Partial<{ recordNumber: string; reason: string }> = {}) => ({
  recordNumber: world.patient.recordNumber,
  reason: REASON,
  ...over,
})

describe('openRecord', () => {
  it('opens the record for eight hours, writes the audit row and tells the unit’s leads without a name', () => {
    const answer = openRecord(makeCtx(world.db, world.outsider), given())
    expect(answer).toEqual({ patientId: world.patient.id, expiresAt: NOW + 8 * HOUR_MS })
    expect(world.db.select().from(recordOpenings).all()).toMatchObject([
      { personId: world.outsider.id, unitId: world.medical.unit.id, reason: REASON, openedAt: NOW },
    ])
    expect(auditRows(world.db, 'opening.open')).toMatchObject([
      { subjectId: world.patient.id, actorId: world.outsider.id, unitId: world.medical.unit.id },
    ])
    const mails = world.db.select().from(mailLedger).all()
    expect(mails).toMatchObject([{ kind: 'record_opened', personId: world.lead.id, unitId: world.medical.unit.id }])
    for (const secret of [world.patient.familyName, world.patient.givenName, world.patient.recordNumber]) {
      expect(JSON.stringify(mails)).not.toContain(secret)
    }
  })

  it('lets the reader read for eight hours and not a moment longer, each read with its audit row, and never write', () => {
    expectRefusal(() => readPatient(makeCtx(world.db, world.outsider), { patientId: world.patient.id }), 'NOT_FOUND')
    openRecord(makeCtx(world.db, world.outsider), given())
    const read = (now: number) => readPatient(makeCtx(world.db, world.outsider, now), { patientId: world.patient.id })
    expect(read(NOW + 8 * HOUR_MS - 1)).toMatchObject({
      isOpening: true,
      openUntil: NOW + 8 * HOUR_MS,
      patient: { id: world.patient.id },
    })
    expect(Object.values(read(NOW).may).every((may) => !may)).toBe(true)
    expect(auditRows(world.db, 'patient.read_by_opening')).toHaveLength(2)
    expect(auditRows(world.db, 'patient.read_by_opening')).toMatchObject([
      { actorId: world.outsider.id, subjectId: world.patient.id },
      {},
    ])
    expectRefusal(() => read(NOW + 8 * HOUR_MS), 'NOT_FOUND')
    const settings = {
      episodeId: world.episode.id,
      observed: at(NOW),
      amends: null,
      mode: 'PC-CSV' as const,
      fio2Fraction: 0.4,
      peepCmH2O: 5,
      setRatePerMin: null,
      setTidalVolumeMl: null,
      inspiratoryPressureCmH2O: null,
      pressureSupportCmH2O: null,
      measuredRatePerMin: null,
      measuredTidalVolumeMl: null,
      peakPressureCmH2O: null,
      plateauPressureCmH2O: null,
      spo2Percent: null,
    }
    expectRefusal(() => recordSettings(makeCtx(world.db, world.outsider), settings), 'FORBIDDEN')
  })

  it('opens one patient only', () => {
    const other = makePatient(world.db, world.hospital.id, world.rt.id)
    openRecord(makeCtx(world.db, world.outsider), given())
    expectRefusal(() => readPatient(makeCtx(world.db, world.outsider), { patientId: other.id }), 'NOT_FOUND')
  })

  it('needs no opening for a patient of one’s own unit', () => {
    expect(openRecord(makeCtx(world.db, world.nurse), given())).toEqual({ patientId: world.patient.id, expiresAt: null })
    expect(world.db.select().from(recordOpenings).all()).toEqual([])
    expect(world.db.select().from(mailLedger).all()).toEqual([])
  })

  it('refuses an administrator without a role, and writes the refusal down', () => {
    expectRefusal(() => openRecord(makeCtx(world.db, world.administrator), given()), 'FORBIDDEN')
    expect(auditRows(world.db, 'access.denied')).toMatchObject([
      { actorId: world.administrator.id, after: { asked: 'opening.open' } },
    ])
    expect(world.db.select().from(recordOpenings).all()).toEqual([])
  })

  it('finds no unknown number, no patient of another hospital, and nobody who never had a bed', () => {
    const elsewhere = makeWorld(world.db)
    const bedless = makePatient(world.db, world.hospital.id, world.rt.id)
    const ctx = makeCtx(world.db, world.outsider)
    for (const recordNumber of ['NO SUCH', elsewhere.patient.recordNumber, bedless.recordNumber]) {
      expectRefusal(() => openRecord(ctx, given({ recordNumber })), 'NOT_FOUND', 'recordNumber')
    }
    expect(auditRows(world.db, 'access.denied')).toHaveLength(3)
    expect(JSON.stringify(auditRows(world.db, 'access.denied'))).not.toContain('NO SUCH')
    expect(world.db.select().from(patients).all()).toHaveLength(3)
  })

  it('leaves nothing behind when the audit row cannot be written, no mail either', () => {
    expectNothingLeft(makeCtx(world.db, world.outsider), openRecord, given(), 'opening.open')
  })

  it('opens once and mails once for a request that arrives twice', () => {
    expectOnce(world.db, world.outsider, openRecord, given(), given({ reason: 'Quite another reason' }))
    expect(world.db.select().from(mailLedger).all()).toHaveLength(1)
  })

  it('asks through its route for a reason of at least ten characters', async () => {
    const { cookie } = makeSession(world.db, world.outsider.id)
    const short = await POST(makeRequest('/api/openings', { body: given({ reason: 'consult' }), cookie }), routeParams())
    expect(short.status).toBe(422)
    expect(await short.json()).toMatchObject({ fields: { reason: expect.stringContaining('10 characters') as string } })
    const body = given({ recordNumber: ` ${world.patient.recordNumber.toLowerCase()} ` })
    expect((await POST(makeRequest('/api/openings', { body, cookie }), routeParams())).status).toBe(200)
  })
})

describe('listOpenings', () => {
  it('shows the unit lead who opened what, when and why, newest first', () => {
    const second = makePerson(world.db, world.hospital.id, [{ unitId: world.surgical.unit.id, role: 'physician' }], {
      name: 'Second Reader',
    })
    openRecord(makeCtx(world.db, world.outsider, NOW - 9 * HOUR_MS), given())
    openRecord(makeCtx(world.db, second), given({ reason: 'Planned transfer tomorrow' }))
    expect(listOpenings(makeCtx(world.db, world.lead), { unitId: world.medical.unit.id }).openings).toMatchObject([
      {
        personName: 'Second Reader',
        reason: 'Planned transfer tomorrow',
        isOpen: true,
        patientId: world.patient.id,
        familyName: world.patient.familyName,
      },
      { personName: 'Otis Outsider', reason: REASON, isOpen: false },
    ])
  })

  it('is for the unit lead only', () => {
    expectDoor(world, listOpenings, { unitId: world.medical.unit.id }, world.physician)
  })

  it('answers through its route', async () => {
    const { cookie } = makeSession(world.db, world.lead.id)
    const response = await GET(makeRequest('/api/x', { method: 'GET', cookie }), routeParams({ unitId: world.medical.unit.id }))
    expect(await response.json()).toMatchObject({ openings: [], unit: { name: 'Medical ICU' } })
  })
})
