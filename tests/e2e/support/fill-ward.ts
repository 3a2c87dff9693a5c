// A program of its own: fills an empty folder with the database of a ward in the morning, and writes what stands in it to ward.json.
// Use: node --conditions=react-server --import tsx tests/e2e/support/fill-ward.ts <name>
import { mkdirSync, rmSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { migrateDatabase, openDatabase, type Db } from '@/db/client'
import { savePasswordHash } from '@/db/queries/sessions'
import { mailSchedules } from '@/db/schema'
import { hashPassword } from 'better-auth/crypto'
import { recordHoldStart } from '@/lib/services/holds/record-start'
import { recordScreen } from '@/lib/services/screens/record'
import { endTrial } from '@/lib/services/trials/end'
import { observeTrial } from '@/lib/services/trials/observe'
import { startTrial } from '@/lib/services/trials/start'
import { newId } from '@/lib/shared/ids'
import { HOUR_MS, MINUTE_MS } from '@/lib/shared/time'
import type { ClinicalRole } from '@/lib/weaning/vocabulary'
import {
  makeAdmitted,
  makeCtx,
  makeHospital,
  makePatient,
  makePerson,
  makeSettings,
  makeStay,
  makeUnit,
} from '../../helpers/factories'
import { holdInput, screenInput, trialEnd, trialInput, trialLook } from '../../helpers/steps'
import { at } from '../../helpers/verb-checks'
import { morningZone, PASSWORD, PATIENTS, PEOPLE, testFolder, type PatientKey, type Ward, type Who } from './places'

const FAMILY_NAMES = [
  'Alderwick',
  'Brightwater',
  'Copperfen',
  'Dunmarrow',
  'Elderglade',
  'Fernsby',
  'Greywillow',
  'Hollowell',
  'Inkersley',
  'Juniperton',
  'Kettlebrook',
  'Larkmeadow',
  'Mosswood',
  'Nettlecombe',
  'Oakhanger',
  'Pebblewick',
  'Quillbrook',
  'Rushworthy',
  'Saltmarsh',
  'Thistledown',
]
const minutesAgo = (minutes: number) => Date.now() - minutes * MINUTE_MS

function fillWard(db: Db, hash: string): Ward {
  const zone = morningZone()
  const clock = (minutes: number) => at(minutesAgo(minutes), zone)
  const hospital = makeHospital(db, { name: 'Invented General' })
  const keys = Object.keys(PATIENTS) as PatientKey[]
  const medical = makeUnit(db, hospital.id, { name: 'Medical ICU', timeZone: zone, bedCount: keys.length + 6 })
  const surgical = makeUnit(db, hospital.id, { name: 'Surgical ICU', timeZone: zone, bedPrefix: 'S' })
  db.insert(mailSchedules)
    .values([{ unitId: medical.unit.id }, { unitId: surgical.unit.id }])
    .run()
  const roles: Record<Who, [string, ClinicalRole][]> = {
    rt: [[medical.unit.id, 'rt']],
    nurse: [[medical.unit.id, 'nurse']],
    physician: [[medical.unit.id, 'physician']],
    lead: [[medical.unit.id, 'unit_lead']],
    outsider: [[surgical.unit.id, 'rt']],
    administrator: [],
    resetter: [[medical.unit.id, 'nurse']],
    sleeper: [[medical.unit.id, 'rt']],
  }
  const cast = Object.fromEntries(
    Object.entries(PEOPLE).map(([who, over]) => {
      const held = roles[who as Who].map(([unitId, role]) => ({ unitId, role }))
      const person = makePerson(db, hospital.id, held, { ...over, isAdministrator: who === 'administrator' })
      savePasswordHash(db, { id: newId(), personId: person.id, hash, now: Date.now() })
      return [who, person]
    }),
  ) as Record<Who, ReturnType<typeof makePerson>>
  const place = { unitId: medical.unit.id, protocolVersionId: medical.protocolVersion.id, recordedBy: cast.rt.id }
  const admit = (index: number, isVentilated: boolean) => {
    const bed = medical.beds[index]
    if (!bed) throw new Error('The ward has too few beds.')
    const who = {
      familyName: FAMILY_NAMES[index] ?? 'Umber',
      givenName: 'Sam',
      recordNumber: `W${String(index + 1).padStart(4, '0')}`,
    }
    const startedAt = minutesAgo(30 * 60)
    if (!isVentilated) {
      const patient = makePatient(db, hospital.id, cast.rt.id, who)
      const stay = makeStay(db, { patientId: patient.id, unitId: medical.unit.id, bedId: bed.id, startedAt })
      return { patientId: patient.id, episodeId: '', stayId: stay.id, bed: bed.label, ...who }
    }
    const { patient, stay, episode } = makeAdmitted(
      db,
      { unit: medical.unit, bed, protocolVersionId: medical.protocolVersion.id, by: cast.rt.id },
      { patient: who, stay: { startedAt: startedAt - HOUR_MS }, episode: { startedAt } },
    )
    makeSettings(db, episode, place, { observedAt: minutesAgo(8 * 60), pressureSupportCmH2O: 8 })
    return { patientId: patient.id, episodeId: episode.id, stayId: stay.id, bed: bed.label, ...who }
  }
  const patients = {} as Ward['patients']
  keys.forEach((key, index) => {
    patients[key] = admit(index, key !== 'breathing' && key !== 'leaving')
  })

  const ready = (key: PatientKey, minutes: number) =>
    recordScreen(makeCtx(db, cast.rt, Date.now()), screenInput(patients[key].episodeId, { observed: clock(minutes) }))
  const noSedation = (key: PatientKey, minutes: number) =>
    recordHoldStart(
      makeCtx(db, cast.nurse, Date.now()),
      holdInput(patients[key].episodeId, { observed: clock(minutes), start: 'not_needed', safety: null, infusions: [] }),
    )
  const onTrial = (key: PatientKey, minutes: number) => {
    ready(key, minutes + 20)
    noSedation(key, minutes + 15)
    const started = startTrial(
      makeCtx(db, cast.rt, Date.now()),
      trialInput(patients[key].episodeId, { observed: clock(minutes) }),
    )
    observeTrial(
      makeCtx(db, cast.rt, Date.now()),
      trialLook(patients[key].episodeId, started.trialId, { observed: clock(minutes - 5) }),
    )
    return started
  }
  const passed = (key: PatientKey) => {
    const { trialId } = onTrial(key, 50)
    endTrial(makeCtx(db, cast.rt, Date.now()), trialEnd(patients[key].episodeId, trialId, { observed: clock(15) }))
  }

  ready('nurse', 60)
  ready('holdStart', 60)
  ready('onHold', 60)
  const { holdId } = recordHoldStart(
    makeCtx(db, cast.nurse, Date.now()),
    holdInput(patients.onHold.episodeId, { observed: clock(45) }),
  )
  ready('trialStart', 60)
  noSedation('trialStart', 55)
  const { trialId } = onTrial('onTrial', 40)
  passed('physician')
  passed('decision')

  const [bed] = surgical.beds
  if (!bed) throw new Error('The other unit has no bed.')
  const outside = makeAdmitted(
    db,
    { unit: surgical.unit, bed, protocolVersionId: surgical.protocolVersion.id, by: cast.outsider.id },
    {
      patient: { familyName: 'Underhay', givenName: 'Val', recordNumber: 'X0001' },
      stay: { startedAt: minutesAgo(31 * 60) },
      episode: { startedAt: minutesAgo(30 * 60) },
    },
  )
  return {
    zone,
    unitId: medical.unit.id,
    otherUnitId: surgical.unit.id,
    patients,
    running: { holdId, trialId },
    freeBeds: medical.beds.slice(keys.length).map(({ id, label }) => ({ id, label })),
    outsidePatient: { patientId: outside.patient.id, episodeId: outside.episode.id, recordNumber: outside.patient.recordNumber },
  }
}

const folder = testFolder(process.argv[2] ?? 'ward')
rmSync(folder, { recursive: true, force: true })
mkdirSync(folder, { recursive: true, mode: 0o700 })
const db = openDatabase(join(folder, 'daybreath.db'))
migrateDatabase(db)
writeFileSync(join(folder, 'ward.json'), JSON.stringify(fillWard(db, await hashPassword(PASSWORD))))
db.$client.close()
