import { mailLedger } from '@/db/schema'
import { recordHoldStart } from '@/lib/services/holds/record-start'
import { createAccountLink } from '@/lib/services/people/account-link'
import { saveDraft } from '@/lib/services/protocols/save-draft'
import { readDecisionForm } from '@/lib/services/decisions/read-form'
import { startTrial } from '@/lib/services/trials/start'
import { defaultProtocol } from '@/lib/weaning/published/default-protocol'
import { ALL_SAFE, CALM, holdInput, PROPOFOL, READY, trialInput, withFio2Limit } from '../helpers/steps'
import { ago, castCtx, PASSWORD, type Cast, type Scene } from './scene'

type Prepared = { params?: Record<string, string>; body?: unknown; search?: string }
type Expected = Record<Cast, number>
export type Row = {
  route: string
  method: 'GET' | 'POST'
  expected: Expected
  /** Sets the scene where that is needed, and says with what the route is called. */
  prepare: (scene: Scene) => Prepared
}

const everybody = (status: number): Expected => ({
  nobody: status,
  rt: status,
  nurse: status,
  physician: status,
  unitLead: status,
  otherUnitRt: status,
  otherUnitAll: status,
  administrator: status,
  deactivated: status,
  otherHospital: status,
})
/** A thing of the unit: those with another role there are forbidden, for everybody else it does not exist. */
const ofUnit = (may: readonly ('rt' | 'nurse' | 'physician' | 'unitLead')[], over: Partial<Expected> = {}): Expected => ({
  ...everybody(404),
  nobody: 401,
  deactivated: 401,
  rt: 403,
  nurse: 403,
  physician: 403,
  unitLead: 403,
  ...Object.fromEntries(may.map((who) => [who, 200])),
  ...over,
})
/** The administration of the hospital. `far` is what the administrator of another hospital gets. */
const ofHospital = (far: number): Expected => ({
  ...everybody(403),
  nobody: 401,
  deactivated: 401,
  administrator: 200,
  otherHospital: far,
})
const ofSelf: Expected = { ...everybody(200), nobody: 401, deactivated: 401 }

const CLINICIANS = ['rt', 'nurse', 'physician', 'unitLead'] as const
const BEDSIDE = ['rt', 'nurse', 'physician'] as const

const unit = (scene: Scene) => ({ unitId: scene.here.unit.id })
const patient = (scene: Scene) => ({ patientId: scene.patient.id })
const episode = (scene: Scene) => ({ episodeId: scene.episode.id })
const atUnit = (scene: Scene): Prepared => ({ params: unit(scene) })
const atPatient = (scene: Scene): Prepared => ({ params: patient(scene) })
const atEpisode = (scene: Scene): Prepared => ({ params: episode(scene) })
const nothing = (): Prepared => ({})

const identity = {
  recordNumber: 'N-1',
  familyName: 'Newly',
  givenName: 'Admitted',
  birthDate: '1961-05-20',
  sex: null,
  heightCm: null,
  weightKg: null,
}
const settingsBody = {
  observed: ago(5),
  mode: 'PC-CSV',
  fio2Fraction: 0.4,
  peepCmH2O: 6,
  setRatePerMin: null,
  setTidalVolumeMl: null,
  inspiratoryPressureCmH2O: null,
  pressureSupportCmH2O: 8,
  measuredRatePerMin: null,
  measuredTidalVolumeMl: null,
  peakPressureCmH2O: null,
  plateauPressureCmH2O: null,
  spo2Percent: 96,
}
const gasBody = {
  observed: ago(5),
  ph: 7.38,
  paCO2MmHg: 42,
  paO2MmHg: 78,
  fio2Fraction: 0.4,
  bicarbonateMmolPerL: null,
  lactateMmolPerL: null,
  haemoglobinGPerDl: null,
}
export const screenBody = { observed: ago(50), seenLatestId: null, excuse: null, note: null, readings: READY }
export const holdBody = {
  observed: ago(45),
  seenLatestId: null,
  start: 'started',
  safety: ALL_SAFE,
  infusions: [PROPOFOL],
  note: null,
}
export const trialBody = {
  observed: ago(40),
  seenLatestId: null,
  technique: 't_piece',
  pressureSupportCmH2O: null,
  peepCmH2O: null,
  fio2Fraction: 0.4,
  plannedDurationMin: 30,
  baseline: CALM,
  startedAnywayBecause: 'asked for at the bedside',
}
export const holdLookBody = { observed: ago(20), readings: CALM, opensEyesToVoice: 'yes' }
export const holdEndBody = { observed: ago(10), outcome: 'stopped', rulesMet: [], note: 'taken to a procedure' }
export const trialLookBody = { observed: ago(20), readings: CALM }
export const trialEndBody = {
  observed: ago(5),
  outcome: 'stopped',
  rulesMet: [],
  signs: [],
  returnedTo: 'PC-CSV as before',
  reason: 'taken to a procedure',
}

/** A hold that runs since 45 min, or a trial since 40 min, recorded by those whose step it is. */
export const withHold = (scene: Scene) => ({
  ...episode(scene),
  holdId: recordHoldStart(castCtx(scene, 'nurse'), holdInput(scene.episode.id, { observed: ago(45) })).holdId,
})
export const withTrial = (scene: Scene) => {
  const input = trialInput(scene.episode.id, { observed: ago(40), startedAnywayBecause: 'asked for at the bedside' })
  return { ...episode(scene), trialId: startTrial(castCtx(scene, 'rt'), input).trialId }
}
export const decisionBody = (scene: Scene) => {
  const form = readDecisionForm(castCtx(scene, 'physician'), episode(scene))
  return {
    seenLatestId: form.seenLatestId,
    seenEvidenceHash: form.evidenceHash,
    choice: 'extubate',
    reasons: [],
    lookAgain: null,
    supportAfter: 'oxygen',
    steroidsPlanned: null,
    note: null,
    password: PASSWORD,
  }
}
const withDraft = (scene: Scene): Prepared => {
  const input = { ...unit(scene), version: null, content: withFio2Limit(0.4), note: 'FiO2 at most 0.40' }
  const draft = saveDraft(castCtx(scene, 'unitLead'), input)
  return { params: unit(scene), body: { draftId: draft.id, version: draft.version, startDay: null, note: null } }
}
const withLink = (scene: Scene): Prepared => {
  const link = createAccountLink(scene.db, { kind: 'invitation', personId: scene.invited.id, now: Date.now() })
  return { body: { kind: 'invitation', token: new URL(link).searchParams.get('token'), password: 'a brand new sentence' } }
}
const place = { timeZone: 'America/Denver', altitudeM: 1450, barometricPressureMmHg: null }
const onInvited = (scene: Scene, body: object): Prepared => ({
  params: { personId: scene.invited.id },
  body: { version: 1, ...body },
})

/** Every route and method, and what each caller gets for a request that is right in itself. */
export const ACCESS_TABLE: readonly Row[] = [
  { route: '/api/health', method: 'GET', expected: everybody(200), prepare: nothing },
  // The four steps of signing in that stand open are listed in access.test.ts; anything else below is not found.
  { route: '/api/auth/[...all]', method: 'GET', expected: everybody(404), prepare: nothing },
  { route: '/api/auth/[...all]', method: 'POST', expected: everybody(404), prepare: nothing },
  { route: '/api/session/accept', method: 'POST', expected: everybody(200), prepare: withLink },

  { route: '/api/me', method: 'GET', expected: ofSelf, prepare: nothing },
  {
    route: '/api/me/password',
    method: 'POST',
    expected: ofSelf,
    prepare: () => ({ body: { currentPassword: PASSWORD, newPassword: 'another long sentence' } }),
  },
  { route: '/api/session/lock', method: 'POST', expected: ofSelf, prepare: nothing },
  { route: '/api/session/unlock', method: 'POST', expected: ofSelf, prepare: () => ({ body: { password: PASSWORD } }) },
  { route: '/api/session/end-all', method: 'POST', expected: ofSelf, prepare: nothing },
  {
    route: '/api/openings',
    method: 'POST',
    expected: { ...ofSelf, administrator: 403, otherHospital: 404 },
    prepare: (scene) => ({ body: { recordNumber: scene.patient.recordNumber, reason: 'asked for advice by the unit' } }),
  },

  { route: '/api/admin/hospital', method: 'GET', expected: ofHospital(200), prepare: nothing },
  {
    route: '/api/admin/hospital',
    method: 'POST',
    expected: ofHospital(200),
    prepare: () => ({ body: { name: 'Renamed Hospital', idleLockMin: 10, version: 1 } }),
  },
  { route: '/api/admin/units', method: 'GET', expected: ofHospital(200), prepare: nothing },
  {
    route: '/api/admin/units',
    method: 'POST',
    expected: ofHospital(200),
    prepare: () => ({ body: { name: 'Cardiac ICU', ...place, bedLabels: ['C01'] } }),
  },
  {
    route: '/api/admin/units/[unitId]',
    method: 'POST',
    expected: ofHospital(404),
    prepare: (scene) => ({
      params: unit(scene),
      body: {
        version: 1,
        name: 'Renamed ICU',
        ...place,
        timeZone: scene.here.unit.timeZone,
        dayTrackFromHour: 4,
        dayTrackToHour: 20,
      },
    }),
  },
  {
    route: '/api/admin/units/[unitId]/beds',
    method: 'POST',
    expected: ofHospital(404),
    prepare: (scene) => ({ params: unit(scene), body: { bedLabels: ['M77'] } }),
  },
  {
    route: '/api/admin/beds/[bedId]/retire',
    method: 'POST',
    expected: ofHospital(404),
    prepare: (scene) => ({ params: { bedId: scene.bedsHere[3] ?? '' } }),
  },
  { route: '/api/admin/people', method: 'GET', expected: ofHospital(200), prepare: nothing },
  {
    route: '/api/admin/people',
    method: 'POST',
    expected: ofHospital(404),
    prepare: (scene) => ({
      body: {
        name: 'New Colleague',
        email: 'new@example.invalid',
        isAdministrator: false,
        memberships: [{ ...unit(scene), role: 'nurse' }],
      },
    }),
  },
  {
    route: '/api/admin/people/[personId]/deactivate',
    method: 'POST',
    expected: ofHospital(404),
    prepare: (scene) => onInvited(scene, {}),
  },
  {
    route: '/api/admin/people/[personId]/reinvite',
    method: 'POST',
    expected: ofHospital(404),
    prepare: (scene) => onInvited(scene, {}),
  },
  {
    route: '/api/admin/people/[personId]/roles',
    method: 'POST',
    expected: ofHospital(404),
    prepare: (scene) => onInvited(scene, { isAdministrator: false, memberships: [{ ...unit(scene), role: 'rt' }] }),
  },

  { route: '/api/units/[unitId]/today', method: 'GET', expected: ofUnit(CLINICIANS), prepare: atUnit },
  { route: '/api/units/[unitId]/patients', method: 'GET', expected: ofUnit(CLINICIANS), prepare: atUnit },
  {
    route: '/api/units/[unitId]/patients',
    method: 'POST',
    expected: ofUnit(BEDSIDE),
    prepare: (scene) => ({ params: unit(scene), body: { ...identity, bedId: scene.bedsHere[2], observed: ago(10) } }),
  },
  { route: '/api/units/[unitId]/protocol', method: 'GET', expected: ofUnit(CLINICIANS), prepare: atUnit },
  {
    route: '/api/units/[unitId]/protocol/draft',
    method: 'POST',
    expected: ofUnit(['unitLead']),
    prepare: (scene) => ({ params: unit(scene), body: { version: null, content: defaultProtocol, note: 'As before' } }),
  },
  { route: '/api/units/[unitId]/protocol/approve', method: 'POST', expected: ofUnit(['physician']), prepare: withDraft },
  { route: '/api/units/[unitId]/mail', method: 'GET', expected: ofUnit(CLINICIANS), prepare: atUnit },
  {
    route: '/api/units/[unitId]/mail/schedule',
    method: 'POST',
    expected: ofUnit(['unitLead']),
    prepare: (scene) => ({
      params: unit(scene),
      body: { version: 1, morningTime: '05:30', isWindowEndOn: true, isDecisionOwedOn: true },
    }),
  },
  {
    route: '/api/units/[unitId]/mail/[mailId]/resend',
    method: 'POST',
    expected: ofUnit(['unitLead']),
    prepare: (scene) => {
      if (scene.db.select().from(mailLedger).all().length === 0) throw new Error('The scene has no message.')
      return { params: { ...unit(scene), mailId: scene.mailId } }
    },
  },
  { route: '/api/units/[unitId]/review', method: 'GET', expected: ofUnit(CLINICIANS), prepare: atUnit },
  {
    route: '/api/units/[unitId]/review/csv',
    method: 'GET',
    expected: ofUnit(['physician', 'unitLead']),
    prepare: (scene) => ({ params: unit(scene), search: '?measure=ventilator_days' }),
  },
  { route: '/api/units/[unitId]/openings', method: 'GET', expected: ofUnit(['unitLead']), prepare: atUnit },

  { route: '/api/patients/[patientId]', method: 'GET', expected: ofUnit(CLINICIANS), prepare: atPatient },
  {
    route: '/api/patients/[patientId]',
    method: 'POST',
    expected: ofUnit(BEDSIDE),
    prepare: (scene) => ({ params: patient(scene), body: { ...identity, version: 1 } }),
  },
  { route: '/api/patients/[patientId]/move', method: 'GET', expected: ofUnit(BEDSIDE), prepare: atPatient },
  {
    route: '/api/patients/[patientId]/move',
    method: 'POST',
    expected: ofUnit(BEDSIDE),
    prepare: (scene) => ({
      params: patient(scene),
      body: { stayId: scene.stay.id, unitId: scene.here.unit.id, bedId: scene.bedsHere[2], observed: ago(10) },
    }),
  },
  {
    route: '/api/patients/[patientId]/episodes',
    method: 'POST',
    expected: ofUnit(BEDSIDE),
    prepare: (scene) => ({
      params: { patientId: scene.breathing.id },
      body: { observed: ago(10), start: 'intubated', airway: 'endotracheal_tube' },
    }),
  },
  {
    route: '/api/patients/[patientId]/end-stay',
    method: 'POST',
    expected: ofUnit(BEDSIDE),
    prepare: (scene) => ({
      params: { patientId: scene.breathing.id },
      body: { stayId: scene.breathingStay.id, end: 'left_unit', observed: ago(10) },
    }),
  },

  {
    route: '/api/episodes/[episodeId]/end',
    method: 'POST',
    expected: ofUnit(BEDSIDE),
    prepare: (scene) => ({
      params: episode(scene),
      body: { version: 1, observed: ago(10), end: 'self_extubated', supportAfter: 'oxygen', reason: 'pulled the tube' },
    }),
  },
  {
    // The start was recorded by the therapist: the nurse has the role, but neither wrote it nor is a physician.
    route: '/api/episodes/[episodeId]/correct',
    method: 'POST',
    expected: ofUnit(['rt', 'physician']),
    prepare: (scene) => ({
      params: episode(scene),
      body: {
        version: 1,
        began: { observed: ago(48 * 60 + 30), start: 'intubated' },
        ended: null,
        reason: 'read from the wrong line',
      },
    }),
  },
  {
    route: '/api/episodes/[episodeId]/settings',
    method: 'POST',
    expected: ofUnit(BEDSIDE),
    prepare: (scene) => ({ params: episode(scene), body: settingsBody }),
  },
  {
    route: '/api/episodes/[episodeId]/gases',
    method: 'POST',
    expected: ofUnit(BEDSIDE),
    prepare: (scene) => ({ params: episode(scene), body: gasBody }),
  },
  {
    route: '/api/episodes/[episodeId]/airway',
    method: 'POST',
    expected: ofUnit(BEDSIDE),
    prepare: (scene) => ({ params: episode(scene), body: { observed: ago(10), event: 'tracheostomy_placed' } }),
  },
  { route: '/api/episodes/[episodeId]/screens', method: 'GET', expected: ofUnit(CLINICIANS), prepare: atEpisode },
  {
    route: '/api/episodes/[episodeId]/screens',
    method: 'POST',
    expected: ofUnit(['rt', 'physician']),
    prepare: (scene) => ({ params: episode(scene), body: screenBody }),
  },
  { route: '/api/episodes/[episodeId]/holds', method: 'GET', expected: ofUnit(CLINICIANS), prepare: atEpisode },
  {
    route: '/api/episodes/[episodeId]/holds',
    method: 'POST',
    expected: ofUnit(['nurse', 'physician']),
    prepare: (scene) => ({ params: episode(scene), body: holdBody }),
  },
  {
    route: '/api/episodes/[episodeId]/holds/[holdId]/observations',
    method: 'POST',
    expected: ofUnit(BEDSIDE),
    prepare: (scene) => ({ params: withHold(scene), body: holdLookBody }),
  },
  {
    route: '/api/episodes/[episodeId]/holds/[holdId]/end',
    method: 'POST',
    expected: ofUnit(['nurse', 'physician']),
    prepare: (scene) => ({ params: withHold(scene), body: holdEndBody }),
  },
  { route: '/api/episodes/[episodeId]/trials', method: 'GET', expected: ofUnit(CLINICIANS), prepare: atEpisode },
  {
    route: '/api/episodes/[episodeId]/trials',
    method: 'POST',
    expected: ofUnit(['rt', 'physician']),
    prepare: (scene) => ({ params: episode(scene), body: trialBody }),
  },
  {
    route: '/api/episodes/[episodeId]/trials/[trialId]/observations',
    method: 'POST',
    expected: ofUnit(BEDSIDE),
    prepare: (scene) => ({ params: withTrial(scene), body: trialLookBody }),
  },
  {
    route: '/api/episodes/[episodeId]/trials/[trialId]/end',
    method: 'POST',
    expected: ofUnit(['rt', 'physician']),
    prepare: (scene) => ({ params: withTrial(scene), body: trialEndBody }),
  },
  { route: '/api/episodes/[episodeId]/decisions', method: 'GET', expected: ofUnit(CLINICIANS), prepare: atEpisode },
  {
    route: '/api/episodes/[episodeId]/decisions',
    method: 'POST',
    expected: ofUnit(['physician']),
    prepare: (scene) => ({ params: episode(scene), body: decisionBody(scene) }),
  },
]
