import { createHash } from 'node:crypto'
import { readdirSync, readFileSync } from 'node:fs'
import { eq } from 'drizzle-orm'
import Papa from 'papaparse'
import pino from 'pino'
import { beforeAll, describe, expect, it, onTestFinished, vi } from 'vitest'
import { insertPerson } from '@/db/queries/people'
import {
  auditLog,
  decisions,
  episodes,
  gases,
  holds,
  hospitals,
  idempotencyKeys,
  mailLedger,
  memberships,
  patients,
  people,
  screens,
  session,
  sessionStates,
  settings,
  stays,
  trialEnds,
  trials,
  units,
  user,
} from '@/db/schema'
import { composeMessage } from '@/lib/mail/message'
import { fileTransport } from '@/lib/mail/transport'
import { log } from '@/lib/server/log'
import { verifyAuditLog } from '@/lib/server/verify-audit'
import { recordGasSchema } from '@/lib/schemas/gases'
import { recordSettingsSchema } from '@/lib/schemas/settings'
import { recordSettings } from '@/lib/services/settings/record'
import { createAccountLink } from '@/lib/services/people/account-link'
import { newId } from '@/lib/shared/ids'
import { HOUR_MS, MINUTE_MS } from '@/lib/shared/time'
import type { ErrorDto } from '@/lib/shared/errors'
import { makeTestFolder } from '../helpers/database'
import { makeAdmitted, makeCtx, makeHospital, makePerson, makeUnit } from '../helpers/factories'
import { cookieOf, makeSession, routeParams, serveDatabase } from '../helpers/test-server'
import { countRows, dumpRows, expectRefusal } from '../helpers/verb-checks'
import {
  ACCESS_TABLE,
  decisionBody,
  holdBody,
  holdEndBody,
  holdLookBody,
  screenBody,
  trialBody,
  trialEndBody,
  trialLookBody,
  withHold,
  withTrial,
} from './access-table'
import { findRoutes, type Handler } from './routes'
import { ago, freezeScene, makeScene, PASSWORD, PATIENT_WORDS, requestBy, type Cast, type Scene } from './scene'

let routes: Awaited<ReturnType<typeof findRoutes>>
let freshScene: () => Scene
beforeAll(async () => {
  routes = await findRoutes()
  freshScene = freezeScene(await makeScene())
})

const open = (): Scene => {
  const scene = freshScene()
  serveDatabase(scene.db)
  return scene
}
const handlerOf = (route: string, method: string): Handler => {
  const handler = routes.get(route)?.[method]
  if (!handler) throw new Error(`${method} ${route} is not there.`)
  return handler
}
type Answer = { status: number; text: string; body: Record<string, unknown> & Partial<ErrorDto> }
type Sent = Parameters<typeof requestBy>[2] & { params?: Record<string, string> }

/** Calls a route as the server would: the address carries the parameters. */
async function send(scene: Scene, route: string, sent: Sent = {}): Promise<Answer> {
  const { params = {}, method = 'POST', ...rest } = sent
  const path = route.replaceAll(/\[(\w+)\]/g, (_, name: string) => encodeURIComponent(params[name] ?? 'missing'))
  const response = await handlerOf(route, method)(requestBy(scene, path, { method, ...rest }), routeParams(params))
  const text = await response.text()
  const isJson = response.headers.get('content-type')?.includes('json') ?? false
  return { status: response.status, text, body: isJson ? (JSON.parse(text) as Answer['body']) : {} }
}

const AUTH = '/api/auth/[...all]'
const SETTINGS = '/api/episodes/[episodeId]/settings'
const SCREENS = '/api/episodes/[episodeId]/screens'
const auth = async (scene: Scene, step: string, sent: Sent) =>
  handlerOf(AUTH, 'POST')(requestBy(scene, `/api/auth/${step}`, sent), routeParams())
const here = (scene: Scene) => ({ episodeId: scene.episode.id })
const unitHere = (scene: Scene) => ({ unitId: scene.here.unit.id })
const settingsBody = (over: object = {}) => ({
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
  ...over,
})
const admission = (scene: Scene, over: object = {}) => ({
  recordNumber: 'N-1',
  familyName: 'Newly',
  givenName: 'Admitted',
  birthDate: '1961-05-20',
  sex: null,
  heightCm: null,
  weightKg: null,
  bedId: scene.bedsHere[2],
  observed: ago(10),
  ...over,
})
const denied = (scene: Scene) => scene.db.select().from(auditLog).where(eq(auditLog.action, 'access.denied')).all()
const recordSettingsAs = async (scene: Scene, who: Cast, over: object = {}) => {
  const answer = await send(scene, SETTINGS, { who, params: here(scene), body: settingsBody(over) })
  expect(answer.status, answer.text).toBe(200)
  return String(answer.body['id'])
}

describe('requests that another site sends', () => {
  const origins = [
    null,
    '',
    'null',
    'https://elsewhere.invalid',
    'http://daybreath.test.elsewhere.invalid',
    'http://daybreath.test:8080',
    'https://daybreath.test',
    'http://daybreath.test/',
    'HTTP://DAYBREATH.TEST@elsewhere.invalid',
  ]

  it('are refused by every write route for every foreign or missing origin, and change nothing', async () => {
    const scene = open()
    const before = dumpRows(scene.db)
    for (const row of ACCESS_TABLE.filter(({ method }) => method === 'POST')) {
      for (const origin of origins) {
        const path = row.route === AUTH ? '/api/auth/sign-in/email' : '/api/x'
        const response = await handlerOf(row.route, 'POST')(
          requestBy(scene, path, { who: 'physician', headers: { origin } }),
          routeParams(),
        )
        expect(response.status, `${row.route} from ${origin}`).toBe(403)
      }
    }
    expect(dumpRows(scene.db)).toEqual(before)
  })

  it('find no read that changes anything: an export alone leaves its audit row', async () => {
    for (const row of ACCESS_TABLE.filter(({ method }) => method === 'GET')) {
      const scene = open()
      const { params = {}, search = '' } = row.prepare(scene)
      const who = row.expected.unitLead === 200 ? 'unitLead' : row.expected.rt === 200 ? 'rt' : 'administrator'
      const before = dumpRows(scene.db, ['audit_log'])
      const answer = await send(scene, row.route, {
        who,
        method: 'GET',
        params,
        search,
        headers: { 'x-http-method-override': 'POST' },
      })
      expect(answer.status, row.route).toBe(row.expected[who])
      expect(dumpRows(scene.db, ['audit_log']), row.route).toEqual(before)
      const audited = scene.db
        .select()
        .from(auditLog)
        .all()
        .map(({ action }) => action)
      expect(audited, row.route).toEqual(row.route.endsWith('/csv') ? ['review.export'] : [])
    }
  })
})

describe('bodies that no form of ours sends', () => {
  it.each(['text/plain', 'application/x-www-form-urlencoded', 'multipart/form-data; boundary=x', 'application/jsonx', null])(
    'are refused as %s',
    async (type) => {
      const scene = open()
      const before = countRows(scene.db)
      const rawBody = new TextEncoder().encode(JSON.stringify(settingsBody()))
      const answer = await send(scene, SETTINGS, { who: 'rt', params: here(scene), rawBody, headers: { 'content-type': type } })
      expect(answer).toMatchObject({ status: 422, body: { code: 'INVALID' } })
      expect(countRows(scene.db)).toEqual(before)
    },
  )

  it('are taken as JSON with a character set', async () => {
    const scene = open()
    const headers = { 'content-type': 'application/json; charset=UTF-8' }
    expect((await send(scene, SETTINGS, { who: 'rt', params: here(scene), body: settingsBody(), headers })).status).toBe(200)
  })

  it.each(['null', '[]', '5', '"text"', '{', 'NaN', '{"fio2Fraction":NaN}', '\u0000', '{}{}', '[{"fio2Fraction":0.4}]'])(
    'are refused as %j, never as a fault',
    async (rawBody) => {
      const scene = open()
      const answer = await send(scene, SETTINGS, { who: 'rt', params: here(scene), rawBody })
      expect(answer).toMatchObject({ status: 422, body: { code: 'INVALID' } })
    },
  )

  it('are refused at 1 MB, and read no further than the limit when they never end', async () => {
    const scene = open()
    const long = JSON.stringify(settingsBody({ note: 'x'.repeat(1_000_000) }))
    expect((await send(scene, SETTINGS, { who: 'rt', params: here(scene), rawBody: long })).status).toBe(422)
    for (const [route, path] of [
      [SETTINGS, '/api/x'],
      [AUTH, '/api/auth/sign-in/email'],
      ['/api/session/accept', '/api/x'],
    ] as const) {
      let pulled = 0
      const endless = new ReadableStream({
        pull: (controller) => {
          pulled += 1
          controller.enqueue(new Uint8Array(10_000).fill(32))
        },
      })
      const request = requestBy(scene, path, { who: 'rt' })
      const init: RequestInit & { duplex: 'half' } = { method: 'POST', headers: request.headers, body: endless, duplex: 'half' }
      const response = await handlerOf(route, 'POST')(new Request(request.url, init), routeParams(here(scene)))
      expect(response.status, route).toBe(422)
      expect(pulled, route).toBeLessThan(20)
    }
  })

  it('are no fault when they are nested 20,000 deep', async () => {
    const scene = open()
    const deep = `${'['.repeat(20_000)}${']'.repeat(20_000)}`
    const body = JSON.stringify(settingsBody())
    const inField = body.replace('"mode":"PC-CSV"', `"mode":${deep}`)
    expect((await send(scene, SETTINGS, { who: 'rt', params: here(scene), rawBody: inField })).status).toBe(422)
    const inUnknown = body.replace('{', `{"unknown":${deep},`)
    expect((await send(scene, SETTINGS, { who: 'rt', params: here(scene), rawBody: inUnknown })).status).toBe(200)
  })

  it('reach no prototype, neither by body nor by query', async () => {
    const scene = open()
    const poison = '"__proto__":{"polluted":1,"isAdministrator":true},"constructor":{"prototype":{"polluted":1}},'
    const rawBody = JSON.stringify({ ...screenBody })
      .replace('{', `{${poison}`)
      .replace('"readings":{', `"readings":{${poison}`)
    const answer = await send(scene, SCREENS, { who: 'rt', params: here(scene), rawBody })
    expect(answer.status, answer.text).toBe(200)
    const hold = JSON.stringify(holdBody).replace('"safety":{', '"safety":{"__proto__":true,')
    expect(
      (await send(scene, '/api/episodes/[episodeId]/holds', { who: 'nurse', params: here(scene), rawBody: hold })).status,
    ).toBeLessThan(500)
    const search = '?__proto__=1&__proto__[polluted]=1&constructor[prototype][polluted]=1&toString=1'
    expect(
      (await send(scene, '/api/units/[unitId]/today', { who: 'rt', method: 'GET', params: unitHere(scene), search })).status,
    ).toBe(200)
    expect(Reflect.get({}, 'polluted')).toBeUndefined()
    const [row] = scene.db.select().from(screens).all()
    expect(JSON.stringify(row)).not.toContain('polluted')
    expect((await send(scene, '/api/admin/people', { who: 'rt', method: 'GET' })).status).toBe(403)
  })

  it('set nothing that is the server’s to say: author, time, verdict, version, hospital', async () => {
    const scene = open()
    const forged = {
      id: 'mine',
      entryId: 'mine',
      entryVersion: 9,
      recordedBy: scene.people.physician.id,
      recordedAt: 1,
      observedAt: 1,
      ventilatorDay: '2001-01-01',
      unitId: scene.there.unit.id,
      protocolVersionId: scene.there.protocolVersion.id,
      result: 'ready',
      verdict: { result: 'ready' },
      isWithdrawn: true,
    }
    const readings = { ...screenBody.readings, fio2Fraction: 0.9 }
    const answer = await send(scene, SCREENS, { who: 'rt', params: here(scene), body: { ...screenBody, ...forged, readings } })
    expect(answer.body['result']).toBe('not_ready')
    const [row] = scene.db.select().from(screens).all()
    expect(row).toMatchObject({
      recordedBy: scene.people.rt.id,
      unitId: scene.here.unit.id,
      protocolVersionId: scene.here.protocolVersion.id,
      entryVersion: 1,
      result: 'not_ready',
      isWithdrawn: false,
    })
    expect(row?.id).not.toBe('mine')
    expect(Math.abs((row?.recordedAt ?? 0) - Date.now())).toBeLessThan(60_000)
    const far = { ...admission(scene), hospitalId: scene.far.unit.hospitalId, createdBy: scene.people.physician.id, id: 'mine' }
    expect((await send(scene, '/api/units/[unitId]/patients', { who: 'rt', params: unitHere(scene), body: far })).status).toBe(
      200,
    )
    const patient = scene.db.select().from(patients).where(eq(patients.recordNumber, 'N-1')).get()
    expect(patient).toMatchObject({ hospitalId: scene.hospital.id, createdBy: scene.people.rt.id })
  })
})

describe('ids that do not belong together', () => {
  it('the address wins over body and query', async () => {
    const scene = open()
    const foreign = { episodeId: scene.elsewhere.episode.id, unitId: scene.there.unit.id, patientId: scene.elsewhere.patient.id }
    expect(
      (await send(scene, SETTINGS, { who: 'rt', params: here(scene), body: { ...settingsBody(), ...foreign } })).status,
    ).toBe(200)
    expect(
      scene.db
        .select()
        .from(settings)
        .all()
        .map(({ episodeId }) => episodeId),
    ).toEqual([scene.episode.id])
    const own = { ...settingsBody(), ...here(scene), ...unitHere(scene) }
    expect((await send(scene, SETTINGS, { who: 'rt', params: { episodeId: foreign.episodeId }, body: own })).status).toBe(404)
    const search = `?patientId=${foreign.patientId}&unitId=${foreign.unitId}`
    const read = await send(scene, '/api/patients/[patientId]', {
      who: 'rt',
      method: 'GET',
      params: { patientId: scene.patient.id },
      search,
    })
    expect(read.text).toContain(PATIENT_WORDS[0])
    expect(read.text).not.toContain(scene.elsewhere.patient.familyName)
    const refused = await send(scene, '/api/patients/[patientId]', {
      who: 'rt',
      method: 'GET',
      params: { patientId: foreign.patientId },
      search: `?patientId=${scene.patient.id}`,
    })
    expect(refused.status).toBe(404)
  })

  it('admits into beds of the unit only, and moves only within the hospital, into a bed of the unit that is named', async () => {
    const scene = open()
    const [, thereBed] = scene.there.beds
    const [farBed] = scene.far.beds
    for (const bedId of [thereBed?.id, farBed?.id, scene.bedsHere[0], 'x']) {
      const answer = await send(scene, '/api/units/[unitId]/patients', {
        who: 'nurse',
        params: unitHere(scene),
        body: admission(scene, { bedId }),
      })
      expect(answer).toMatchObject({ status: 422, body: { fields: { bedId: expect.any(String) } } })
      expect(PATIENT_WORDS.filter((word) => answer.text.includes(word))).toEqual([])
    }
    const targets = [
      [scene.here.unit.id, thereBed?.id, 'bedId'],
      [scene.far.unit.id, farBed?.id, 'unitId'],
      [scene.there.unit.id, farBed?.id, 'bedId'],
      [scene.there.unit.id, scene.bedsHere[2], 'bedId'],
    ] as const
    for (const [unitId, bedId, field] of targets) {
      const body = { stayId: scene.stay.id, unitId, bedId, observed: ago(5) }
      const answer = await send(scene, '/api/patients/[patientId]/move', {
        who: 'nurse',
        params: { patientId: scene.patient.id },
        body,
      })
      expect(answer).toMatchObject({ status: 422, body: { fields: { [field]: expect.any(String) } } })
    }
    const body = { stayId: scene.breathingStay.id, unitId: scene.here.unit.id, bedId: scene.bedsHere[2], observed: ago(5) }
    expect(
      (await send(scene, '/api/patients/[patientId]/move', { who: 'nurse', params: { patientId: scene.patient.id }, body }))
        .status,
    ).toBe(409)
  })

  it('finds no hold, trial, earlier version, message, draft or role of another unit', async () => {
    const scene = open()
    const { holdId } = withHold(scene)
    const { trialId } = withTrial(scene)
    const second = makeAdmitted(
      scene.db,
      {
        unit: scene.here.unit,
        bed: { ...scene.here.beds[2], id: scene.bedsHere[2] ?? '' } as Scene['here']['beds'][number],
        protocolVersionId: scene.here.protocolVersion.id,
        by: scene.people.rt.id,
      },
      { stay: { startedAt: Date.now() - 60 * HOUR_MS }, episode: { startedAt: Date.now() - 48 * HOUR_MS } },
    )
    const other = { episodeId: second.episode.id }
    const tries: [string, Cast, Record<string, string>, object][] = [
      ['/api/episodes/[episodeId]/holds/[holdId]/observations', 'nurse', { ...other, holdId }, holdLookBody],
      ['/api/episodes/[episodeId]/holds/[holdId]/end', 'nurse', { ...other, holdId }, holdEndBody],
      ['/api/episodes/[episodeId]/trials/[trialId]/observations', 'rt', { ...other, trialId }, trialLookBody],
      ['/api/episodes/[episodeId]/trials/[trialId]/end', 'rt', { ...other, trialId }, trialEndBody],
      ['/api/episodes/[episodeId]/trials/[trialId]/end', 'rt', { ...here(scene), trialId: holdId }, trialEndBody],
      ['/api/episodes/[episodeId]/holds/[holdId]/end', 'nurse', { ...here(scene), holdId: trialId }, holdEndBody],
      ['/api/units/[unitId]/mail/[mailId]/resend', 'otherUnitAll', { unitId: scene.there.unit.id, mailId: scene.mailId }, {}],
      [
        '/api/units/[unitId]/protocol/approve',
        'otherUnitAll',
        { unitId: scene.there.unit.id },
        {
          draftId: scene.here.protocolVersion.id,
          version: 1,
          startDay: null,
          note: null,
        },
      ],
    ]
    const before = dumpRows(scene.db, ['audit_log'])
    for (const [route, who, params, body] of tries) {
      const answer = await send(scene, route, { who, params, body })
      expect(answer.status, `${route} ${answer.text}`).toBe(404)
    }
    const farRole = { isAdministrator: false, version: 1, memberships: [{ unitId: scene.far.unit.id, role: 'rt' }] }
    const roles = await send(scene, '/api/admin/people/[personId]/roles', {
      who: 'administrator',
      params: { personId: scene.invited.id },
      body: farRole,
    })
    expect(roles.status).toBe(404)
    expect(dumpRows(scene.db, ['audit_log'])).toEqual(before)
    expect(denied(scene)).toHaveLength(tries.length + 1)
  })

  it('reads no version of another episode through a form that asks to correct it, nor another patient’s episode', async () => {
    const scene = open()
    const theirs = await send(scene, SCREENS, {
      who: 'otherUnitAll',
      params: { episodeId: scene.elsewhere.episode.id },
      body: { ...screenBody, note: 'a secret of the other unit' },
    })
    expect(theirs.status, theirs.text).toBe(200)
    const { id } = theirs.body as { id: string }
    const forms = ACCESS_TABLE.filter(({ route, method }) => method === 'GET' && route.startsWith('/api/episodes/'))
    expect(forms.length).toBeGreaterThanOrEqual(4)
    for (const { route } of forms) {
      const answer = await send(scene, route, { who: 'physician', method: 'GET', params: here(scene), search: `?amend=${id}` })
      expect(answer.text, route).not.toContain('a secret of the other unit')
      if (answer.status === 200) expect(answer.body['amending'] ?? null, route).toBeNull()
    }
    const search = `?episodeId=${scene.elsewhere.episode.id}`
    const read = await send(scene, '/api/patients/[patientId]', {
      who: 'rt',
      method: 'GET',
      params: { patientId: scene.patient.id },
      search,
    })
    expect(read.status).toBe(404)
  })

  const STRANGE = [
    '../../../etc/passwd',
    '..%2f..%2fetc%2fpasswd',
    '%00',
    '\u0000',
    `' OR 1=1 --`,
    `"; DROP TABLE patients; --`,
    '__proto__',
    'constructor',
    'undefined',
    'null',
    '[object Object]',
    ' ',
    '🫁',
    'ä'.repeat(3_000),
    'x'.repeat(8_000),
    '%',
    '*',
    '\\',
    'javascript:alert(1)',
    '<script>',
  ]
  it.each(STRANGE)('is not found, and no fault, for every route under the id %j', async (id) => {
    const scene = open()
    const before = countRows(scene.db)
    for (const row of ACCESS_TABLE.filter(({ route }) => /\[\w+\]/.test(route))) {
      const { body, search } = row.prepare(freshScene())
      const params = Object.fromEntries([...row.route.matchAll(/\[(\w+)\]/g)].map(([, name = '']) => [name, id]))
      const who = row.route.startsWith('/api/admin') ? 'administrator' : 'physician'
      const answer = await send(scene, row.route, { who, method: row.method, params, body, ...(search ? { search } : {}) })
      expect([403, 404, 422], `${row.method} ${row.route} ${answer.text}`).toContain(answer.status)
      expect(answer.text.length).toBeLessThan(2_000)
    }
    const { audit_log: rows, ...after } = countRows(scene.db)
    const { audit_log: rowsBefore = 0, ...others } = before
    expect(after).toEqual(others)
    expect(rows).toBeGreaterThan(rowsBefore)
    for (const row of denied(scene)) expect(JSON.stringify(row).length).toBeLessThan(1_500)
  })
})

describe('an idempotency key', () => {
  const key = { 'idempotency-key': 'one-and-the-same' }
  const settingsAs = (scene: Scene, who: Cast, over: object = {}) =>
    send(scene, SETTINGS, { who, params: here(scene), body: settingsBody(over), headers: key })

  it('of another person is another key', async () => {
    const scene = open()
    const [first, second] = [await settingsAs(scene, 'rt'), await settingsAs(scene, 'nurse')]
    expect([first.status, second.status]).toEqual([200, 200])
    expect(first.body['id']).not.toBe(second.body['id'])
    expect(scene.db.select().from(settings).all()).toHaveLength(2)
  })

  it('used again for other values, for another patient, or for another action is a conflict', async () => {
    const scene = open()
    expect((await settingsAs(scene, 'rt')).status).toBe(200)
    expect((await settingsAs(scene, 'rt', { fio2Fraction: 0.5 })).status).toBe(409)
    const screen = await send(scene, SCREENS, { who: 'rt', params: here(scene), body: screenBody, headers: key })
    expect(screen.status).toBe(409)
    expect(scene.db.select().from(screens).all()).toEqual([])
    expect(scene.db.select().from(settings).all()).toHaveLength(1)
  })

  it('of a deactivation does not swallow the invitation that follows', async () => {
    const scene = open()
    const asked = { who: 'administrator', params: { personId: scene.invited.id }, body: { version: 1 }, headers: key } as const
    expect((await send(scene, '/api/admin/people/[personId]/deactivate', asked)).status).toBe(200)
    expect((await send(scene, '/api/admin/people/[personId]/reinvite', asked)).status).toBe(409)
  })

  it('gives no answer to somebody whose right has ended since', async () => {
    const scene = open()
    expect((await settingsAs(scene, 'rt')).status).toBe(200)
    scene.db.update(memberships).set({ endedAt: 1 }).where(eq(memberships.personId, scene.people.rt.id)).run()
    expect((await settingsAs(scene, 'rt')).status).toBe(404)
  })

  it('is refused when it is empty or longer than any of ours', async () => {
    const scene = open()
    for (const long of ['', 'x'.repeat(101), 'x'.repeat(10_000)]) {
      const answer = await send(scene, SETTINGS, {
        who: 'rt',
        params: here(scene),
        body: settingsBody(),
        headers: { 'idempotency-key': long },
      })
      expect(answer.status).toBe(422)
    }
    expect(scene.db.select().from(idempotencyKeys).all()).toEqual([])
  })
})

describe('the session', () => {
  const read = (scene: Scene, cookie: string, headers: Record<string, string> = {}) =>
    send(scene, '/api/units/[unitId]/today', { cookie, method: 'GET', params: unitHere(scene), headers })
  const smuggled = {
    'x-daybreath-active': '1',
    'x-daybreath-path': '/',
    'x-middleware-subrequest': 'proxy',
    'x-forwarded-host': 'daybreath.test',
    'x-nonce': 'x',
    'x-user-id': 'x',
    authorization: 'Bearer x',
    'x-forwarded-for': '127.0.0.1',
    'x-original-url': '/api/me',
  }

  it('is not opened by any header: none, locked, idle, expired or deactivated', async () => {
    const scene = open()
    const { rt, deactivated } = scene.people
    const now = Date.now()
    const locked = makeSession(scene.db, rt.id, { lockedAt: now })
    const idle = makeSession(scene.db, rt.id, { createdAt: now - HOUR_MS, lastActiveAt: now - 16 * MINUTE_MS })
    const expired = makeSession(scene.db, rt.id, { createdAt: now - 12 * HOUR_MS, lastActiveAt: now })
    const gone = makeSession(scene.db, deactivated.id)
    const runOut = makeSession(scene.db, rt.id)
    scene.db
      .update(session)
      .set({ expiresAt: new Date(now - 1) })
      .where(eq(session.id, runOut.sessionId))
      .run()
    for (const headers of [{}, smuggled]) {
      expect((await read(scene, '', headers)).status).toBe(401)
      expect((await read(scene, locked.cookie, headers)).status).toBe(423)
      expect((await read(scene, idle.cookie, headers)).status).toBe(423)
      expect((await read(scene, expired.cookie, headers)).status).toBe(401)
      expect((await read(scene, gone.cookie, headers)).status).toBe(401)
      expect((await read(scene, runOut.cookie, headers)).status).toBe(401)
    }
    const states = scene.db.select().from(sessionStates).all()
    expect(states.find(({ sessionId }) => sessionId === idle.sessionId)?.lastActiveAt).toBe(now - 16 * MINUTE_MS)
  })

  it('writes nothing at a locked screen, also with the right role', async () => {
    const scene = open()
    const { cookie } = makeSession(scene.db, scene.people.rt.id, { lockedAt: Date.now() })
    const answer = await send(scene, SETTINGS, { cookie, params: here(scene), body: settingsBody() })
    expect(answer).toMatchObject({ status: 423, body: { code: 'LOCKED' } })
    expect(scene.db.select().from(settings).all()).toEqual([])
  })

  it('dies with its person, in the middle of the work', async () => {
    const scene = open()
    await recordSettingsAs(scene, 'rt')
    const body = { version: 1 }
    const asked = { who: 'administrator', params: { personId: scene.people.rt.id }, body } as const
    expect((await send(scene, '/api/admin/people/[personId]/deactivate', asked)).status).toBe(200)
    expect(
      (await send(scene, SETTINGS, { who: 'rt', params: here(scene), body: settingsBody({ observed: ago(4) }) })).status,
    ).toBe(401)
    expect(scene.db.select().from(session).where(eq(session.userId, scene.people.rt.id)).all()).toEqual([])
  })

  it('takes no cookie that was changed anywhere', async () => {
    const scene = open()
    const [mine, theirs] = [
      makeSession(scene.db, scene.people.rt.id).cookie,
      makeSession(scene.db, scene.people.physician.id).cookie,
    ]
    const [name = '', value = ''] = mine.split('=')
    const signed = decodeURIComponent(value)
    const dot = signed.lastIndexOf('.')
    const [token, signature] = [signed.slice(0, dot), signed.slice(dot + 1)]
    const otherToken = decodeURIComponent(theirs.split('=')[1] ?? '').split('.')[0] ?? ''
    const flipped = (text: string) => `${text.startsWith('a') ? 'b' : 'a'}${text.slice(1)}`
    const otherSecret = createHash('sha256').update(token).digest('base64')
    const forged = [
      `${flipped(token)}.${signature}`,
      `${token}.${flipped(signature)}`,
      `${otherToken}.${signature}`,
      `${token}.`,
      token,
      `.${signature}`,
      `${token}.${signature.slice(0, 20)}`,
      `${token}.${otherSecret}`,
      `${token}${token}.${signature}`,
      `${token.toUpperCase()}.${signature}`,
    ]
    expect((await read(scene, mine)).status).toBe(200)
    for (const bad of forged) expect((await read(scene, `${name}=${encodeURIComponent(bad)}`)).status, bad).toBe(401)
    expect((await read(scene, `__Secure-${mine}`)).status).toBe(401)
  })

  it('after sign-in is a new one, whatever cookie the browser brought along', async () => {
    const scene = open()
    const email = scene.db.select().from(user).where(eq(user.id, scene.people.rt.id)).get()?.email ?? ''
    const planted = makeSession(scene.db, scene.people.nurse.id)
    const answer = await auth(scene, 'sign-in/email', { cookie: planted.cookie, body: { email, password: PASSWORD } })
    const fresh = cookieOf(answer) ?? ''
    expect(answer.status).toBe(200)
    expect(fresh).not.toBe('')
    expect(fresh).not.toBe(planted.cookie)
    expect((await read(scene, planted.cookie)).status).toBe(401)
    const me = await send(scene, '/api/me', { cookie: fresh, method: 'GET' })
    expect(me.body['name']).toBe(scene.people.rt.name)
    const made = 'daybreath.session_token=chosen-by-somebody-else.c2lnbmF0dXJl'
    const again = await auth(scene, 'sign-in/email', { cookie: made, body: { email, password: PASSWORD } })
    expect(cookieOf(again)).not.toContain('chosen-by-somebody-else')
  })

  it('gives five tries at the own password in all, from however many sessions and addresses', async () => {
    const scene = open()
    const statuses: number[] = []
    for (let tried = 0; tried < 7; tried += 1) {
      const { cookie } = makeSession(scene.db, scene.people.physician.id)
      const body = { ...decisionBody(scene), password: `wrong ${tried}` }
      const headers = {
        'x-forwarded-for': `203.0.113.${tried}`,
        'x-real-ip': `203.0.113.${tried}`,
        forwarded: `for=203.0.113.${tried}`,
      }
      statuses.push(
        (await send(scene, '/api/episodes/[episodeId]/decisions', { cookie, params: here(scene), body, headers })).status,
      )
    }
    expect(statuses).toEqual([422, 422, 422, 422, 422, 429, 429])
    const right = { who: 'physician', params: here(scene), body: decisionBody(scene) } as const
    expect((await send(scene, '/api/episodes/[episodeId]/decisions', right)).status).toBe(429)
    expect(scene.db.select().from(decisions).all()).toEqual([])
  })
})

describe('text that is meant for another program', () => {
  const FORMULAS = [
    '=HYPERLINK("http://elsewhere.invalid","here")',
    '+1+1',
    '-1+1',
    '@SUM(1)',
    "=cmd|' /C calc'!A0",
    'a","=1+1',
    'a\n=1+1',
    'a\r=1',
    '\uff1d1+1',
    ';=1',
  ]

  it.each(FORMULAS)('is no formula in the exported table when the unit is called %j', async (name) => {
    const scene = open()
    scene.db.update(units).set({ name }).where(eq(units.id, scene.here.unit.id)).run()
    const asked = { who: 'unitLead', method: 'GET', params: unitHere(scene), search: '?measure=ventilator_days' } as const
    const answer = await send(scene, '/api/units/[unitId]/review/csv', asked)
    expect(answer.status).toBe(200)
    const { data, errors } = Papa.parse<string[]>(answer.text.replace(/^\ufeff/, '').trimEnd())
    expect(errors.filter(({ type }) => type !== 'FieldMismatch')).toEqual([])
    const cells = data.flat()
    expect(cells.filter((cell) => /^[=+\-@\t\r]/.test(cell))).toEqual([])
    const shown = cells[cells.indexOf('Unit') + 1] ?? ''
    expect([name, `'${name}`]).toContain(shown)
  })

  it('does not leave the quotes of a file name', async () => {
    const scene = open()
    const bad = [
      '?measure=ventilator_days"; x="',
      '?measure=../../x',
      '?measure=ventilator_days&from=2026-01%22%0d%0aX-Injected:1',
      '?measure=constructor',
    ]
    for (const search of bad) {
      const answer = await send(scene, '/api/units/[unitId]/review/csv', {
        who: 'unitLead',
        method: 'GET',
        params: unitHere(scene),
        search,
      })
      expect(answer.status, search).toBe(422)
    }
  })

  const SQLISH = [
    `Robert'); DROP TABLE patients;--`,
    `' OR '1'='1`,
    `"; DELETE FROM stays; --`,
    'a\\',
    '%',
    '_',
    `x' UNION SELECT password FROM account--`,
  ]
  it.each(SQLISH)('is kept and given back as it was typed: %j', async (text) => {
    const scene = open()
    const before = countRows(scene.db)
    const body = admission(scene, { familyName: text, recordNumber: `Q ${text}`.slice(0, 40) })
    const answer = await send(scene, '/api/units/[unitId]/patients', { who: 'rt', params: unitHere(scene), body })
    expect(answer.status, answer.text).toBe(200)
    const list = await send(scene, '/api/units/[unitId]/patients', { who: 'rt', method: 'GET', params: unitHere(scene) })
    const names = (list.body['patients'] as { familyName: string }[]).map(({ familyName }) => familyName)
    expect(names).toHaveLength(3)
    expect(names).toContain(text)
    expect(countRows(scene.db)).toMatchObject({ patients: (before['patients'] ?? 0) + 1, account: before['account'] })
    const opened = await send(scene, '/api/openings', {
      who: 'otherUnitRt',
      body: { recordNumber: `' OR '1'='1`, reason: 'asked for advice by the unit' },
    })
    expect(opened.status).toBe(404)
  })

  it('is text in the HTML of a mail, and begins no header', async () => {
    const scene = open()
    const name = `<img src=x onerror=alert(1)>&"'</title><script>`
    scene.db
      .update(units)
      .set({ name: `${name}\r\nBcc: thief@example.invalid` })
      .where(eq(units.id, scene.here.unit.id))
      .run()
    const body = { recordNumber: scene.patient.recordNumber, reason: 'asked for advice by <b>the unit</b>' }
    expect((await send(scene, '/api/openings', { who: 'otherUnitRt', body })).status).toBe(200)
    const mails = scene.db.select().from(mailLedger).where(eq(mailLedger.kind, 'record_opened')).all()
    expect(mails.length).toBeGreaterThan(0)
    const folder = makeTestFolder()
    const transport = fileTransport(folder)
    onTestFinished(() => transport.close())
    for (const mail of mails) {
      expect(mail.bodyHtml).not.toMatch(/<(img|script|b)\b/)
      expect(mail.bodyHtml).toContain('&lt;img src=x onerror=alert(1)&gt;&amp;&quot;')
      const whole = `${mail.subject} ${mail.bodyText} ${mail.bodyHtml}`
      expect(PATIENT_WORDS.filter((word) => whole.includes(word))).toEqual([])
      expect(whole).not.toContain('asked for advice')
      const { subject, bodyText: text, bodyHtml: html, messageId, recipient: to } = mail
      await transport.deliver({ from: 'Daybreath <daybreath@localhost>', to, subject, text, html, messageId, at: Date.now() })
    }
    for (const file of readdirSync(folder)) {
      const head = readFileSync(`${folder}/${file}`, 'utf8').split('\n\n')[0] ?? ''
      expect(head).toMatch(/^Subject: /m)
      expect(head).not.toMatch(/^Bcc:/im)
    }
    const link = composeMessage({
      subject: 's',
      lead: 'l',
      lines: ['<i>&'],
      link: { label: '"><b>', url: 'http://x/"onclick="y' },
      footer: '<u>',
    })
    expect(link.html).not.toMatch(/<(i|b|u)>|"onclick/)
  })

  it('is refused when it is longer than its field, with words at the field', async () => {
    const scene = open()
    const long = 'x'.repeat(5_000)
    const tries: [string, Cast, Record<string, string>, object, string][] = [
      ['/api/units/[unitId]/patients', 'rt', unitHere(scene), admission(scene, { familyName: long }), 'familyName'],
      ['/api/units/[unitId]/patients', 'rt', unitHere(scene), admission(scene, { recordNumber: long }), 'recordNumber'],
      [SCREENS, 'rt', here(scene), { ...screenBody, note: long }, 'note'],
      [SETTINGS, 'rt', here(scene), settingsBody({ amends: { id: 'x', reason: long } }), 'amends.reason'],
      [
        '/api/episodes/[episodeId]/holds',
        'nurse',
        here(scene),
        { ...holdBody, infusions: [{ ...holdBody.infusions[0], drug: long }] },
        'infusions.0.drug',
      ],
      ['/api/openings', 'otherUnitRt', {}, { recordNumber: 'x', reason: long }, 'reason'],
      ['/api/admin/hospital', 'administrator', {}, { name: long, idleLockMin: 5, version: 1 }, 'name'],
    ]
    for (const [route, who, params, body, field] of tries) {
      const answer = await send(scene, route, { who, params, body })
      expect(answer, route).toMatchObject({ status: 422 })
      expect(Object.keys(answer.body.fields ?? {}), route).toEqual([field])
    }
  })
})

describe('numbers that are none', () => {
  const NONE = [
    '1e309',
    '-1e309',
    '"6"',
    '"0.4"',
    '""',
    'true',
    '[6]',
    '{}',
    '"NaN"',
    '"Infinity"',
    '1e308',
    '-1',
    '1e-320',
    '99999999999999999999',
  ]
  it.each(NONE)('%s is refused wherever a reading must stand', async (raw) => {
    const scene = open()
    const fields = ['fio2Fraction', 'peepCmH2O'] as const
    for (const field of fields) {
      // A value of 0 or next to it is a possible PEEP.
      if (field === 'peepCmH2O' && raw === '1e-320') continue
      const rawBody = JSON.stringify(settingsBody({ [field]: 'HERE' })).replace('"HERE"', raw)
      const answer = await send(scene, SETTINGS, { who: 'rt', params: here(scene), rawBody })
      expect(answer.status, `${field} ${raw} ${answer.text}`).toBe(422)
      expect(Object.keys(answer.body.fields ?? {})).toEqual([field])
    }
    const screen = JSON.stringify({ ...screenBody, readings: { ...screenBody.readings, breathsPerMin: 'HERE' } }).replace(
      '"HERE"',
      raw,
    )
    expect((await send(scene, SCREENS, { who: 'rt', params: here(scene), rawBody: screen })).status).toBe(422)
    expect([...scene.db.select().from(settings).all(), ...scene.db.select().from(screens).all()]).toEqual([])
  })

  it('null is refused where a reading must stand, and −0 is 0', async () => {
    const scene = open()
    for (const field of ['fio2Fraction', 'peepCmH2O']) {
      const answer = await send(scene, SETTINGS, { who: 'rt', params: here(scene), body: settingsBody({ [field]: null }) })
      expect(answer).toMatchObject({ status: 422, body: { fields: { [field]: expect.any(String) } } })
    }
    const rawBody = JSON.stringify(settingsBody()).replace('"peepCmH2O":6', '"peepCmH2O":-0,"confirmedUnlikely":["peepCmH2O"]')
    expect((await send(scene, SETTINGS, { who: 'rt', params: here(scene), rawBody })).status).toBe(200)
    const page = await send(scene, '/api/patients/[patientId]', {
      who: 'rt',
      method: 'GET',
      params: { patientId: scene.patient.id },
    })
    expect(page.text).toContain('"peepCmH2O":0')
    expect(page.text).not.toContain('-0,')
  })

  it.each([Number.NaN, Infinity, -Infinity])('%d is refused by the schemas themselves', (value) => {
    const observed = ago(5)
    expect(recordSettingsSchema.safeParse({ episodeId: 'x', ...settingsBody({ observed, fio2Fraction: value }) }).success).toBe(
      false,
    )
    const gas = {
      episodeId: 'x',
      observed,
      ph: value,
      paCO2MmHg: 42,
      paO2MmHg: 78,
      fio2Fraction: 0.4,
      bicarbonateMmolPerL: null,
      lactateMmolPerL: null,
      haemoglobinGPerDl: null,
    }
    expect(recordGasSchema.safeParse(gas).success).toBe(false)
    expect(recordGasSchema.safeParse({ ...gas, ph: 7.4 }).success).toBe(true)
  })

  it.each(['1.5', '"1"', '1e309', 'null', '-1', '9007199254740993', '0'])('the version %s changes nothing', async (raw) => {
    const scene = open()
    const end = JSON.stringify({ version: 'HERE', observed: ago(5), end: 'self_extubated', supportAfter: 'oxygen' }).replace(
      '"HERE"',
      raw,
    )
    expect([409, 422]).toContain(
      (await send(scene, '/api/episodes/[episodeId]/end', { who: 'rt', params: here(scene), rawBody: end })).status,
    )
    const rename = JSON.stringify({ version: 'HERE', name: 'Taken over', idleLockMin: 5 }).replace('"HERE"', raw)
    expect([409, 422]).toContain((await send(scene, '/api/admin/hospital', { who: 'administrator', rawBody: rename })).status)
    expect(scene.db.select().from(episodes).where(eq(episodes.id, scene.episode.id)).get()?.endedAt).toBeNull()
    expect(
      scene.db
        .select()
        .from(hospitals)
        .all()
        .map(({ name }) => name),
    ).not.toContain('Taken over')
  })
})

describe('times that cannot be', () => {
  const refusedAt = async (scene: Scene, observed: unknown) => {
    const answer = await send(scene, SETTINGS, { who: 'rt', params: here(scene), body: settingsBody({ observed }) })
    return answer.status === 422 ? Object.keys(answer.body.fields ?? {}) : `status ${answer.status}`
  }

  it('are refused at their field: future, before intubation, no such day or time', async () => {
    const scene = open()
    expect(await refusedAt(scene, ago(-3))).toEqual(['observed.time'])
    expect(await refusedAt(scene, ago(48 * 60 + 5))).toEqual(['observed.time'])
    const day = ago(0).day
    for (const time of ['24:00', '5:00', ' 05:00', '05:60', '05:00:00', '\uff10\uff15:00', '', '05:00\n']) {
      expect(await refusedAt(scene, { day, time }), time).toEqual(['observed.time'])
    }
    for (const bad of ['2026-02-30', '2026-13-01', '0000-00-00', '2026-2-3', '26-02-03', '2026-02-03T00:00', '']) {
      expect(await refusedAt(scene, { day: bad, time: '05:00' }), bad).toEqual(['observed.day'])
    }
    for (const past of ['0001-01-01', '0099-12-31', '1899-12-31'])
      expect(await refusedAt(scene, { day: past, time: '05:00' }), past).toEqual(['observed.time'])
    expect(await refusedAt(scene, { day: '9999-12-31', time: '23:59' })).toEqual(['observed.time'])
    for (const none of [null, 5, '2026-03-03 05:00', {}, Date.now()])
      expect((await refusedAt(scene, none)).length).toBeGreaterThan(0)
    expect(scene.db.select().from(settings).all()).toEqual([])
  })

  it('are refused after the end of ventilation, and an end before what stands on record', async () => {
    const scene = open()
    await recordSettingsAs(scene, 'rt', { observed: ago(30) })
    const end = (minutes: number) =>
      send(scene, '/api/episodes/[episodeId]/end', {
        who: 'rt',
        params: here(scene),
        body: { version: 1, observed: ago(minutes), end: 'self_extubated', supportAfter: 'oxygen' },
      })
    expect(await end(40)).toMatchObject({ status: 422, body: { fields: { 'observed.time': expect.any(String) } } })
    expect((await end(20)).status).toBe(200)
    expect(await refusedAt(scene, ago(10))).toEqual(['observed.time'])
    expect((await end(15)).status).toBe(409)
    const sign = { who: 'physician', params: here(scene), body: decisionBody(scene) } as const
    expect((await send(scene, '/api/episodes/[episodeId]/decisions', sign)).status).toBe(409)
  })

  it.each(['0206-03-03', '0026-03-03', '2016-03-03'])('are refused for an admission in the year of %s', async (day) => {
    const scene = open()
    const body = admission(scene, { observed: { day, time: '05:00' } })
    const answer = await send(scene, '/api/units/[unitId]/patients', { who: 'rt', params: unitHere(scene), body })
    expect(answer).toMatchObject({ status: 422, body: { fields: { 'observed.day': expect.stringMatching(/year/) } } })
    expect(scene.db.select().from(stays).all()).toHaveLength(3)
  })

  describe('on the days when the clocks change in Denver', () => {
    const SPRING = Date.UTC(2026, 2, 8, 18)
    const FALL = Date.UTC(2026, 10, 1, 18)
    const denver = (now: number) => {
      const scene = open()
      const hospital = makeHospital(scene.db)
      const { unit, beds, protocolVersion } = makeUnit(scene.db, hospital.id, { timeZone: 'America/Denver' })
      const rt = makePerson(scene.db, hospital.id, [{ unitId: unit.id, role: 'rt' }])
      const [bed] = beds
      if (!bed) throw new Error('The unit has no bed.')
      const { episode } = makeAdmitted(
        scene.db,
        { unit, bed, protocolVersionId: protocolVersion.id, by: rt.id },
        {
          stay: { startedAt: now - 60 * HOUR_MS },
          episode: { startedAt: now - 48 * HOUR_MS },
        },
      )
      const record = (observed: object) =>
        recordSettings(
          makeCtx(scene.db, rt, now),
          recordSettingsSchema.parse({ episodeId: episode.id, ...settingsBody({ observed }) }),
        )
      const lastObserved = () => scene.db.select().from(settings).all().at(-1)
      return { record, lastObserved }
    }

    it('refuse each minute of the skipped hour, and take the ones around it', () => {
      const { record, lastObserved } = denver(SPRING)
      for (const time of ['02:00', '02:30', '02:59'])
        expectRefusal(() => record({ day: '2026-03-08', time }), 'INVALID', 'observed.time', /did not exist/)
      record({ day: '2026-03-08', time: '01:59' })
      expect(lastObserved()?.observedAt).toBe(Date.UTC(2026, 2, 8, 8, 59))
      record({ day: '2026-03-08', time: '03:00' })
      expect(lastObserved()).toMatchObject({ observedAt: Date.UTC(2026, 2, 8, 9), ventilatorDay: '2026-03-08' })
    })

    it('ask which one in the doubled hour, and believe it only there', () => {
      const { record, lastObserved } = denver(FALL)
      expectRefusal(() => record({ day: '2026-11-01', time: '01:30' }), 'INVALID', 'observed.fold', /first or the second/)
      record({ day: '2026-11-01', time: '01:30', fold: 'first' })
      expect(lastObserved()?.observedAt).toBe(Date.UTC(2026, 10, 1, 7, 30))
      record({ day: '2026-11-01', time: '01:30', fold: 'second' })
      expect(lastObserved()?.observedAt).toBe(Date.UTC(2026, 10, 1, 8, 30))
      record({ day: '2026-11-01', time: '03:00', fold: 'second' })
      expect(lastObserved()?.observedAt).toBe(Date.UTC(2026, 10, 1, 10))
      expect(
        recordSettingsSchema.safeParse({
          episodeId: 'x',
          ...settingsBody({ observed: { day: '2026-11-01', time: '01:30', fold: 'third' } }),
        }).success,
      ).toBe(false)
    })
  })
})

describe('corrections', () => {
  const amend = (scene: Scene, who: Cast, id: string, over: object = {}, params = here(scene)) =>
    send(scene, SETTINGS, {
      who,
      params,
      body: settingsBody({ fio2Fraction: 0.35, amends: { id, reason: 'read from the wrong line' }, ...over }),
    })

  it('of somebody else’s entry are for a physician only, and a refused one stands in the audit log', async () => {
    const scene = open()
    const id = await recordSettingsAs(scene, 'rt')
    const original = scene.db.select().from(settings).get()
    const refused = await amend(scene, 'nurse', id)
    expect(refused.status).toBe(403)
    expect(denied(scene)).toMatchObject([
      { actorId: scene.people.nurse.id, requestId: refused.body.requestId, after: { code: 'FORBIDDEN' } },
    ])
    expect((await amend(scene, 'physician', id)).status).toBe(200)
    const rows = scene.db.select().from(settings).all()
    expect(rows).toHaveLength(2)
    expect(rows[0]).toEqual(original)
    expect(rows[1]).toMatchObject({
      supersedesId: id,
      entryVersion: 2,
      recordedBy: scene.people.physician.id,
      amendReason: 'read from the wrong line',
    })
  })

  it('of a version that was corrected already are a conflict, and of two at once one is', async () => {
    const scene = open()
    const id = await recordSettingsAs(scene, 'rt')
    const both = await Promise.all([amend(scene, 'rt', id), amend(scene, 'physician', id)])
    expect(both.map(({ status }) => status).sort()).toEqual([200, 409])
    expect((await amend(scene, 'rt', id)).status).toBe(409)
    expect(scene.db.select().from(settings).all()).toHaveLength(2)
  })

  it('find no entry of another episode and none of another kind', async () => {
    const scene = open()
    const theirs = await send(scene, SETTINGS, {
      who: 'otherUnitRt',
      params: { episodeId: scene.elsewhere.episode.id },
      body: settingsBody(),
    })
    const gas = await send(scene, '/api/episodes/[episodeId]/gases', {
      who: 'rt',
      params: here(scene),
      body: {
        observed: ago(5),
        ph: 7.38,
        paCO2MmHg: 42,
        paO2MmHg: 78,
        fio2Fraction: 0.4,
        bicarbonateMmolPerL: null,
        lactateMmolPerL: null,
        haemoglobinGPerDl: null,
      },
    })
    expect([theirs.status, gas.status]).toEqual([200, 200])
    for (const id of [theirs.body['id'], gas.body['id'], scene.episode.id, 'x', `' OR 1=1 --`]) {
      expect((await amend(scene, 'physician', String(id))).status).toBe(404)
    }
    expect(scene.db.select().from(settings).all()).toHaveLength(1)
    expect(scene.db.select().from(gases).all()).toHaveLength(1)
  })

  it('need a reason, and withdraw nothing by a field of the body', async () => {
    const scene = open()
    const id = await recordSettingsAs(scene, 'rt')
    for (const reason of ['', '  ', 'x', null, 5])
      expect((await amend(scene, 'rt', id, { amends: { id, reason } })).status).toBe(422)
    expect((await amend(scene, 'rt', id, { isWithdrawn: true })).status).toBe(200)
    expect(
      scene.db
        .select()
        .from(settings)
        .all()
        .map(({ isWithdrawn }) => isWithdrawn),
    ).toEqual([false, false])
  })
})

describe('steps out of their order', () => {
  it('take no look at a hold before its start or after its end, and no second end', async () => {
    const scene = open()
    const params = withHold(scene)
    const look = (minutes: number) =>
      send(scene, '/api/episodes/[episodeId]/holds/[holdId]/observations', {
        who: 'nurse',
        params,
        body: { ...holdLookBody, observed: ago(minutes) },
      })
    const end = () => send(scene, '/api/episodes/[episodeId]/holds/[holdId]/end', { who: 'nurse', params, body: holdEndBody })
    expect((await look(46)).body.fields).toHaveProperty(['observed.time'])
    expect((await look(20)).status).toBe(200)
    expect((await end()).status).toBe(200)
    expect((await look(5)).body.fields).toHaveProperty(['observed.time'])
    expect((await end()).status).toBe(409)
    expect((await look(15)).status).toBe(200)
  })

  it('end a trial once, and start no second hold or trial beside a running one', async () => {
    const scene = open()
    withHold(scene)
    const params = withTrial(scene)
    const hold = { ...holdBody, recordAnyway: true }
    const trial = { ...trialBody, recordAnyway: true }
    expect((await send(scene, '/api/episodes/[episodeId]/holds', { who: 'nurse', params: here(scene), body: hold })).status).toBe(
      409,
    )
    expect((await send(scene, '/api/episodes/[episodeId]/trials', { who: 'rt', params: here(scene), body: trial })).status).toBe(
      409,
    )
    const ends = await Promise.all(
      ['rt', 'physician'].map((who) =>
        send(scene, '/api/episodes/[episodeId]/trials/[trialId]/end', { who: who as Cast, params, body: trialEndBody }),
      ),
    )
    expect(ends.map(({ status }) => status).sort()).toEqual([200, 409])
    expect(
      [scene.db.select().from(holds).all(), scene.db.select().from(trials).all(), scene.db.select().from(trialEnds).all()].map(
        ({ length }) => length,
      ),
    ).toEqual([1, 1, 1])
  })

  it('sign no decision on a patient whose ventilation ended while the password was checked', async () => {
    const scene = open()
    const signing = send(scene, '/api/episodes/[episodeId]/decisions', {
      who: 'physician',
      params: here(scene),
      body: decisionBody(scene),
    })
    // The signing request is at its password by now; a colleague is faster.
    await vi.waitFor(() => expect(countRows(scene.db)['rate_limit']).toBe(1), { interval: 1 })
    const end = { version: 1, observed: ago(1), end: 'self_extubated', supportAfter: 'oxygen' }
    expect((await send(scene, '/api/episodes/[episodeId]/end', { who: 'rt', params: here(scene), body: end })).status).toBe(200)
    const signed = await signing
    expect(signed).toMatchObject({ status: 409, body: { message: expect.stringContaining('Ventilation ended') } })
    expect(scene.db.select().from(decisions).all()).toEqual([])
  })

  it('give an administrator a role at the bedside only with a trace', async () => {
    const scene = open()
    const body = { version: 1, isAdministrator: true, memberships: [{ unitId: scene.here.unit.id, role: 'physician' }] }
    const params = { personId: scene.people.administrator.id }
    expect((await send(scene, '/api/admin/people/[personId]/roles', { who: 'administrator', params, body })).status).toBe(200)
    const [row] = scene.db.select().from(auditLog).where(eq(auditLog.action, 'person.set_roles')).all()
    expect(row).toMatchObject({ actorId: scene.people.administrator.id, subjectId: scene.people.administrator.id })
    expect(JSON.stringify(row?.after)).toContain('physician')
  })
})

describe('what must stand nowhere', () => {
  /** Everything that the program writes to its log while a test runs, at its most talkative. */
  function readLog(): () => string {
    const stream = Reflect.get(log, pino.symbols.streamSym) as { write: (line: string) => boolean }
    const lines: string[] = []
    vi.spyOn(stream, 'write').mockImplementation((line) => lines.push(line) > 0)
    const { level } = log
    log.level = 'trace'
    onTestFinished(() => {
      log.level = level
    })
    return () => lines.join('')
  }

  it('a password: not in any table, not as a bare hash, not in the log', async () => {
    const scene = open()
    const logged = readLog()
    log.info('the log is read')
    const email = scene.db.select().from(user).where(eq(user.id, scene.people.physician.id)).get()?.email ?? ''
    const words = {
      wrong: 'WRONG-horse-battery',
      changed: 'CHANGED-horse-battery',
      accepted: 'ACCEPTED-horse-battery',
      reset: 'RESET-horse-battery',
    }
    const sign = (password: string) =>
      send(scene, '/api/episodes/[episodeId]/decisions', {
        who: 'physician',
        params: here(scene),
        body: { ...decisionBody(scene), password },
      })
    expect((await auth(scene, 'sign-in/email', { body: { email, password: PASSWORD } })).status).toBe(200)
    expect((await auth(scene, 'sign-in/email', { body: { email, password: words.wrong } })).status).toBe(422)
    expect((await auth(scene, 'sign-in/email', { body: { email: words.wrong, password: PASSWORD } })).status).toBe(422)
    expect((await auth(scene, 'reset-password', { body: { token: 'x'.repeat(24), newPassword: words.reset } })).status).toBe(409)
    expect((await send(scene, '/api/session/unlock', { who: 'physician', body: { password: words.wrong } })).status).toBe(422)
    expect((await send(scene, '/api/session/unlock', { who: 'physician', body: { password: PASSWORD } })).status).toBe(200)
    expect((await sign(words.wrong)).status).toBe(422)
    expect((await sign(PASSWORD)).status).toBe(200)
    const token = new URL(
      createAccountLink(scene.db, { kind: 'invitation', personId: scene.invited.id, now: Date.now() }),
    ).searchParams.get('token')
    expect(
      (await send(scene, '/api/session/accept', { body: { kind: 'invitation', token, password: words.accepted } })).status,
    ).toBe(200)
    const change = { who: 'physician', body: { currentPassword: PASSWORD, newPassword: words.changed } } as const
    expect((await send(scene, '/api/me/password', change)).status).toBe(200)
    const everything = `${JSON.stringify(dumpRows(scene.db))}${logged()}`
    expect(logged()).toContain('the log is read')
    const secrets = [PASSWORD, ...Object.values(words)]
    const hashes = secrets.flatMap((secret) =>
      ['sha256', 'sha1', 'md5'].flatMap((kind) => {
        const hash = createHash(kind).update(secret).digest()
        return [hash.toString('hex'), hash.toString('base64')]
      }),
    )
    for (const secret of [...secrets, ...hashes]) expect(everything.includes(secret), secret).toBe(false)
    expect(everything).not.toContain(String(token))
    expect(JSON.stringify(scene.db.select().from(auditLog).all())).not.toContain('horse')
    expect(verifyAuditLog(scene.db).isWhole).toBe(true)
  })

  it('a name in the log, or the words of a fault in the answer, when the database itself fails', async () => {
    const scene = open()
    const logged = readLog()
    scene.db.$client.exec(`create temp trigger planned_fault before insert on audit_log when new.action = 'patient.admit'
      begin select raise(abort, 'planned fault'); end`)
    const body = admission(scene, { familyName: 'Unmistakable', recordNumber: 'UM-9' })
    const answer = await send(scene, '/api/units/[unitId]/patients', { who: 'rt', params: unitHere(scene), body })
    expect(answer).toMatchObject({ status: 500, body: { code: 'INTERNAL' } })
    expect(answer.text).not.toMatch(/planned|SQLITE|Unmistakable/i)
    expect(logged()).toContain(String(answer.body.requestId))
    expect(logged()).not.toMatch(/Unmistakable|UM-9/i)
    expect(scene.db.select().from(patients).where(eq(patients.recordNumber, 'UM-9')).all()).toEqual([])
  })

  it('an address or name of a person in another hospital’s administration', async () => {
    const scene = open()
    insertPerson(scene.db, {
      id: newId(),
      hospitalId: scene.hospital.id,
      name: 'Only Here',
      email: 'only-here@example.invalid',
      isAdministrator: false,
      now: Date.now(),
    })
    const list = await send(scene, '/api/admin/people', { who: 'otherHospital', method: 'GET' })
    expect(list.status).toBe(200)
    expect(list.text).not.toContain('Only Here')
    expect(list.text).not.toContain(scene.here.unit.id)
    const own = (list.body['people'] as { id: string }[]).map(({ id }) => id)
    expect(own).toEqual([scene.people.otherHospital.id])
    expect(scene.db.select().from(people).all().length).toBeGreaterThan(own.length)
  })
})
