import Database from 'better-sqlite3'
import { eq } from 'drizzle-orm'
import { drizzle } from 'drizzle-orm/better-sqlite3'
import type { Db } from '@/db/client'
import { savePasswordHash } from '@/db/queries/sessions'
import * as schema from '@/db/schema'
import { hashNewPassword } from '@/lib/server/auth'
import { newId } from '@/lib/shared/ids'
import { HOUR_MS, MINUTE_MS } from '@/lib/shared/time'
import { CLINICAL_ROLES, type ClinicalRole } from '@/lib/weaning/vocabulary'
import { openTestDatabase } from '../helpers/database'
import {
  makeAdmitted,
  makeCtx,
  makeHospital,
  makePatient,
  makePerson,
  makeStay,
  makeUnit,
  type TestPerson,
} from '../helpers/factories'
import { makeSession, TEST_BASE_URL } from '../helpers/test-server'
import { at } from '../helpers/verb-checks'

export const PASSWORD = 'a long enough sentence'
/** Words that stand nowhere but in the records of the unit's patients. */
export const PATIENT_WORDS = ['Quillifer', 'Zebedee', 'ZQ-771904', 'Yarrowby', 'Xanthe', 'ZQ-662813'] as const

export const CAST = [
  'nobody',
  'rt',
  'nurse',
  'physician',
  'unitLead',
  'otherUnitRt',
  'otherUnitAll',
  'administrator',
  'deactivated',
  'otherHospital',
] as const
export type Cast = (typeof CAST)[number]
/** Those who work in the unit and may see its patients. */
export const IN_UNIT: readonly Cast[] = ['rt', 'nurse', 'physician', 'unitLead']

// Routes use the real clock: the unit lies where it is noon now, so that no test crosses its midnight.
const hoursEast = 12 - new Date().getUTCHours()
export const ZONE = `Etc/GMT${hoursEast > 0 ? '-' : '+'}${Math.abs(hoursEast)}`
/** The unit's wall clock some minutes ago, as a form sends it. */
export const ago = (minutes: number) => at(Date.now() - minutes * MINUTE_MS, ZONE)

/**
 * A unit with a ventilated patient (Quillifer) and one who breathes alone (Yarrowby), a second unit, a second hospital, and one person for
 * every kind of caller, each signed in. Everything in it is invented.
 */
export async function makeScene() {
  const db = openTestDatabase()
  const now = Date.now()
  const hash = await hashNewPassword(PASSWORD)
  const hospital = makeHospital(db, { name: 'Invented Hospital' })
  const here = makeUnit(db, hospital.id, { name: 'Medical ICU', timeZone: ZONE })
  const there = makeUnit(db, hospital.id, { name: 'Surgical ICU', timeZone: ZONE, bedPrefix: 'S' })
  const farHospital = makeHospital(db, { name: 'Another Invented Hospital' })
  const far = makeUnit(db, farHospital.id, { name: 'Far ICU', timeZone: ZONE, bedPrefix: 'F' })
  const every = (unitId: string) => CLINICAL_ROLES.map((role) => ({ unitId, role }))
  const inUnit = (role: ClinicalRole) => makePerson(db, hospital.id, [{ unitId: here.unit.id, role }], { name: `Here ${role}` })
  const people: Record<Exclude<Cast, 'nobody'>, TestPerson> = {
    rt: inUnit('rt'),
    nurse: inUnit('nurse'),
    physician: inUnit('physician'),
    unitLead: inUnit('unit_lead'),
    otherUnitRt: makePerson(db, hospital.id, [{ unitId: there.unit.id, role: 'rt' }], { name: 'There rt' }),
    otherUnitAll: makePerson(db, hospital.id, every(there.unit.id), { name: 'There everything' }),
    administrator: makePerson(db, hospital.id, [], { name: 'Here administrator', isAdministrator: true }),
    deactivated: makePerson(db, hospital.id, every(here.unit.id), { name: 'Here no more', isAdministrator: true }),
    otherHospital: makePerson(db, farHospital.id, every(far.unit.id), { name: 'Far everything', isAdministrator: true }),
  }
  for (const person of Object.values(people)) savePasswordHash(db, { id: newId(), personId: person.id, hash, now })
  const secondLead = makePerson(db, hospital.id, [{ unitId: here.unit.id, role: 'unit_lead' }], { name: 'Here second lead' })
  const invited = makePerson(db, hospital.id, [{ unitId: here.unit.id, role: 'nurse' }], { name: 'Here invited' })
  const cookies = Object.fromEntries(Object.entries(people).map(([who, person]) => [who, makeSession(db, person.id).cookie]))
  db.update(schema.people).set({ deactivatedAt: now }).where(eq(schema.people.id, people.deactivated.id)).run()
  const bedsHere = here.beds.map(({ id }) => id)
  const [bed, secondBed, freeBed = '', retireBed = ''] = here.beds
  if (!bed || !secondBed || freeBed === '' || retireBed === '') throw new Error('The unit needs four beds.')
  const place = { protocolVersionId: here.protocolVersion.id, by: people.rt.id }
  const startedAt = now - 48 * HOUR_MS
  const stay = { startedAt: now - 60 * HOUR_MS }
  const ventilated = makeAdmitted(
    db,
    { unit: here.unit, bed, ...place },
    {
      patient: { familyName: PATIENT_WORDS[0], givenName: PATIENT_WORDS[1], recordNumber: PATIENT_WORDS[2] },
      stay,
      episode: { startedAt },
    },
  )
  const breathing = makePatient(db, hospital.id, people.rt.id, {
    familyName: PATIENT_WORDS[3],
    givenName: PATIENT_WORDS[4],
    recordNumber: PATIENT_WORDS[5],
  })
  const breathingStay = makeStay(db, { patientId: breathing.id, unitId: here.unit.id, bedId: secondBed.id, ...stay })
  const [thereBed] = there.beds
  if (!thereBed) throw new Error('The unit has no bed.')
  const elsewhere = makeAdmitted(
    db,
    { unit: there.unit, bed: thereBed, protocolVersionId: there.protocolVersion.id, by: people.otherUnitRt.id },
    { stay, episode: { startedAt } },
  )
  db.insert(schema.mailSchedules).values({ unitId: here.unit.id, morningDueMin: 300 }).run()
  const mailId = newId()
  db.insert(schema.mailLedger)
    .values({
      id: mailId,
      onceKey: 'scene',
      unitId: here.unit.id,
      kind: 'morning_due',
      day: '2026-03-03',
      recipient: 'rt@example.invalid',
      subject: 'Screens due',
      bodyText: 'Bed M01',
      bodyHtml: '<p>Bed M01</p>',
      messageId: '<scene@daybreath.test>',
      state: 'failed',
      queuedAt: now,
      nextAttemptAt: now,
    })
    .run()
  return {
    db,
    people,
    cookies: cookies as Record<Cast, string | undefined>,
    hospital,
    here,
    there,
    far,
    secondLead,
    invited,
    mailId,
    elsewhere,
    patient: ventilated.patient,
    stay: ventilated.stay,
    episode: ventilated.episode,
    breathing,
    breathingStay,
    bedsHere,
  }
}
export type Scene = Awaited<ReturnType<typeof makeScene>>

/** Keeps the scene as it is now; each call of the answer gives a copy of it that nobody has touched. */
export function freezeScene(scene: Scene): () => Scene {
  const image = scene.db.$client.serialize()
  return () => {
    const client = new Database(image)
    client.pragma('foreign_keys = ON')
    client.pragma('recursive_triggers = ON')
    const db: Db = drizzle(client, { schema })
    return { ...scene, db }
  }
}

/** What a verb takes first, for one of the cast, now. */
export const castCtx = (scene: Scene, who: Exclude<Cast, 'nobody'>) => makeCtx(scene.db, scene.people[who], Date.now())

type Sent = {
  who?: Cast
  method?: string
  body?: unknown
  rawBody?: BodyInit
  headers?: Record<string, string | null>
  cookie?: string
  search?: string
}

/** A request by one of the cast, as our own pages send it unless told otherwise; a header given as null is left out. */
export function requestBy(scene: Scene, path: string, sent: Sent = {}): Request {
  const { who = 'nobody', method = 'POST', body, rawBody, headers = {}, cookie = scene.cookies[who], search = '' } = sent
  const isWrite = method !== 'GET' && method !== 'HEAD'
  const all: Record<string, string | null> = {
    ...(isWrite ? { origin: TEST_BASE_URL, 'content-type': 'application/json', 'idempotency-key': newId() } : {}),
    ...(cookie ? { cookie } : {}),
    ...headers,
  }
  const kept = Object.entries(all).filter((pair): pair is [string, string] => pair[1] !== null)
  return new Request(new URL(`${path}${search}`, TEST_BASE_URL), {
    method,
    headers: kept,
    ...(isWrite ? { body: rawBody ?? JSON.stringify(body ?? {}) } : {}),
  })
}
