import type { Db } from '@/db/client'
import {
  airwayEvents,
  auditLog,
  beds,
  episodes,
  gases,
  hospitals,
  memberships,
  patients,
  people,
  protocolVersions,
  settings,
  stays,
  units,
  user,
} from '@/db/schema'
import type { Membership } from '@/lib/access/policy'
import type { Ctx, PersonActor, PersonCtx } from '@/lib/server/ctx'
import { newId } from '@/lib/shared/ids'
import { HOUR_MS, localDay } from '@/lib/shared/time'
import { defaultProtocol } from '@/lib/weaning/published/default-protocol'
import type { ProtocolContent } from '@/lib/weaning/protocol'
import type { ClinicalRole } from '@/lib/weaning/vocabulary'
import { openTestDatabase } from './database'

export const TIME_ZONE = 'America/Denver'
/** Tuesday 3 March 2026, 08:00 in Denver (UTC-7). */
export const NOW = Date.UTC(2026, 2, 3, 15, 0)
export const TODAY = '2026-03-03'

export type UnitRow = typeof units.$inferSelect
export type BedRow = typeof beds.$inferSelect
export type PatientRow = typeof patients.$inferSelect
export type StayRow = typeof stays.$inferSelect
export type EpisodeRow = typeof episodes.$inferSelect
export type TestPerson = { id: string; hospitalId: string; name: string; isAdministrator: boolean; memberships: Membership[] }

let counter = 0
const next = () => (counter += 1)

export function makeHospital(db: Db, over: Partial<typeof hospitals.$inferInsert> = {}) {
  return db
    .insert(hospitals)
    .values({ id: newId(), name: `Invented Hospital ${next()}`, createdAt: NOW - 800 * 24 * HOUR_MS, ...over })
    .returning()
    .get()
}

/** A unit with its default protocol in force since long ago, and beds M01, M02 … */
export function makeUnit(
  db: Db,
  hospitalId: string,
  options: { bedCount?: number; bedPrefix?: string; protocol?: ProtocolContent } & Partial<typeof units.$inferInsert> = {},
) {
  const { bedCount = 4, bedPrefix = 'M', protocol = defaultProtocol, ...over } = options
  const createdAt = NOW - 800 * 24 * HOUR_MS
  const unit = db
    .insert(units)
    .values({ id: newId(), hospitalId, name: `Unit ${next()}`, timeZone: TIME_ZONE, createdAt, ...over })
    .returning()
    .get()
  const protocolVersion = db
    .insert(protocolVersions)
    .values({
      id: newId(),
      unitId: unit.id,
      number: 1,
      content: protocol,
      note: 'Default values',
      isDefault: true,
      draftedAt: createdAt,
      startsAt: createdAt,
    })
    .returning()
    .get()
  const bedRows = Array.from({ length: bedCount }, (_, index) =>
    db
      .insert(beds)
      .values({
        id: newId(),
        unitId: unit.id,
        label: `${bedPrefix}${String(index + 1).padStart(2, '0')}`,
        sortOrder: index + 1,
        createdAt,
      })
      .returning()
      .get(),
  )
  return { unit, beds: bedRows, protocolVersion }
}

/** An account and its person, with roles in units. */
export function makePerson(
  db: Db,
  hospitalId: string,
  roles: Membership[] = [],
  over: { name?: string; email?: string; isAdministrator?: boolean } = {},
): TestPerson {
  const id = newId()
  const name = over.name ?? `Person ${next()}`
  const isAdministrator = over.isAdministrator ?? false
  db.insert(user)
    .values({ id, name, email: over.email ?? `person${next()}@example.invalid` })
    .run()
  db.insert(people)
    .values({ id, hospitalId, name, isAdministrator, createdAt: NOW - 800 * 24 * HOUR_MS })
    .run()
  for (const { unitId, role } of roles) {
    db.insert(memberships)
      .values({ id: newId(), personId: id, unitId, role, startedAt: NOW - 800 * 24 * HOUR_MS })
      .run()
  }
  return { id, hospitalId, name, isAdministrator, memberships: roles }
}

export function toActor(person: TestPerson): PersonActor {
  return {
    kind: 'person',
    personId: person.id,
    sessionId: `session-${person.id}`,
    hospitalId: person.hospitalId,
    name: person.name,
    isAdministrator: person.isAdministrator,
    memberships: person.memberships,
  }
}

/** What a verb takes first, for a person at a moment. */
export function makeCtx(db: Db, person: TestPerson, now: number = NOW, over: Partial<Omit<Ctx, 'actor'>> = {}): PersonCtx {
  return { actor: toActor(person), now, requestId: newId(), db, idempotencyKey: null, ...over }
}

export function makeJobCtx(db: Db, name: string, now: number = NOW): Ctx {
  return { actor: { kind: 'job', name }, now, requestId: newId(), db, idempotencyKey: null }
}

export function makePatient(
  db: Db,
  hospitalId: string,
  createdBy: string,
  over: Partial<typeof patients.$inferInsert> = {},
): PatientRow {
  const count = next()
  return db
    .insert(patients)
    .values({
      id: newId(),
      hospitalId,
      recordNumber: `T${String(count).padStart(6, '0')}`,
      familyName: `Family${count}`,
      givenName: `Given${count}`,
      birthDate: '1961-05-20',
      sex: 'male',
      heightCm: 180,
      weightKg: 82,
      createdAt: NOW - 100 * HOUR_MS,
      createdBy,
      ...over,
    })
    .returning()
    .get()
}

export function makeStay(
  db: Db,
  over: { patientId: string; unitId: string; bedId: string } & Partial<typeof stays.$inferInsert>,
): StayRow {
  return db
    .insert(stays)
    .values({ id: newId(), startedAt: NOW - 60 * HOUR_MS, ...over })
    .returning()
    .get()
}

/** An episode with the airway event that began it. Starts two days before NOW unless told otherwise. */
export function makeEpisode(
  db: Db,
  place: { patientId: string; unitId: string; protocolVersionId: string; recordedBy: string },
  over: Partial<typeof episodes.$inferInsert> = {},
): EpisodeRow {
  const startedAt = over.startedAt ?? NOW - 48 * HOUR_MS
  const episode = db
    .insert(episodes)
    .values({
      id: newId(),
      patientId: place.patientId,
      startedAt,
      start: 'intubated',
      airway: 'endotracheal_tube',
      recordedAt: startedAt,
      recordedBy: place.recordedBy,
      ...over,
    })
    .returning()
    .get()
  db.insert(airwayEvents)
    .values({ ...entryPlace(episode, place, startedAt), event: episode.start })
    .run()
  return episode
}

type EntryPlace = { unitId: string; protocolVersionId: string; recordedBy: string }

/** The columns of a first version, for rows that a test inserts by itself. */
export function entryPlace(episode: { id: string }, place: EntryPlace, observedAt: number, recordedAt: number = observedAt) {
  const id = newId()
  return {
    id,
    entryId: id,
    episodeId: episode.id,
    unitId: place.unitId,
    ventilatorDay: localDay(observedAt, TIME_ZONE),
    observedAt,
    recordedAt,
    recordedBy: place.recordedBy,
    protocolVersionId: place.protocolVersionId,
  }
}

export function makeSettings(db: Db, episode: EpisodeRow, place: EntryPlace, over: Partial<typeof settings.$inferInsert> = {}) {
  const observedAt = over.observedAt ?? NOW - HOUR_MS
  return db
    .insert(settings)
    .values({ ...entryPlace(episode, place, observedAt), mode: 'PC-CSV', fio2Fraction: 0.4, peepCmH2O: 6, ...over })
    .returning()
    .get()
}

export function makeGas(db: Db, episode: EpisodeRow, place: EntryPlace, over: Partial<typeof gases.$inferInsert> = {}) {
  const observedAt = over.observedAt ?? NOW - HOUR_MS
  return db
    .insert(gases)
    .values({
      ...entryPlace(episode, place, observedAt),
      ph: 7.38,
      paCO2MmHg: 42,
      paO2MmHg: 78,
      fio2Fraction: 0.4,
      ...over,
    })
    .returning()
    .get()
}

/** A patient in a bed of the unit, and on the ventilator unless `isVentilated` is false. */
export function makeAdmitted(
  db: Db,
  where: { unit: UnitRow; bed: BedRow; protocolVersionId: string; by: string },
  over: {
    patient?: Partial<typeof patients.$inferInsert>
    stay?: Partial<typeof stays.$inferInsert>
    episode?: Partial<typeof episodes.$inferInsert>
  } = {},
) {
  const patient = makePatient(db, where.unit.hospitalId, where.by, over.patient)
  const stay = makeStay(db, { patientId: patient.id, unitId: where.unit.id, bedId: where.bed.id, ...over.stay })
  const episode = makeEpisode(
    db,
    { patientId: patient.id, unitId: where.unit.id, protocolVersionId: where.protocolVersionId, recordedBy: where.by },
    over.episode,
  )
  return { patient, stay, episode }
}

/**
 * A hospital with two units (four beds each), one person for each role in the first unit, a respiratory therapist of the second unit
 * only, an administrator without roles, and one ventilated patient in the first bed of the first unit.
 */
export function makeWorld(db: Db = openTestDatabase()) {
  const hospital = makeHospital(db)
  const medical = makeUnit(db, hospital.id, { name: 'Medical ICU' })
  const surgical = makeUnit(db, hospital.id, { name: 'Surgical ICU', bedPrefix: 'S' })
  const inUnit = (role: ClinicalRole, name: string) => makePerson(db, hospital.id, [{ unitId: medical.unit.id, role }], { name })
  const rt = inUnit('rt', 'Robin Therapist')
  const nurse = inUnit('nurse', 'Noa Nurse')
  const physician = inUnit('physician', 'Parker Physician')
  const lead = inUnit('unit_lead', 'Lee Lead')
  const outsider = makePerson(db, hospital.id, [{ unitId: surgical.unit.id, role: 'rt' }], { name: 'Otis Outsider' })
  const administrator = makePerson(db, hospital.id, [], { name: 'Ada Administrator', isAdministrator: true })
  const place = { unitId: medical.unit.id, protocolVersionId: medical.protocolVersion.id, recordedBy: rt.id }
  const [bed] = medical.beds
  if (!bed) throw new Error('The unit has no bed.')
  const admitted = makeAdmitted(db, { unit: medical.unit, bed, protocolVersionId: medical.protocolVersion.id, by: rt.id })
  return { db, hospital, medical, surgical, rt, nurse, physician, lead, outsider, administrator, place, bed, ...admitted }
}

/** Audit rows of one action, oldest first. */
export function auditRows(db: Db, action: string) {
  return db
    .select()
    .from(auditLog)
    .all()
    .filter((row) => row.action === action)
}
