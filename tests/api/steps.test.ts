import { beforeEach, describe, expect, it } from 'vitest'
import { GET as readDecision, POST as postDecision } from '@/app/api/episodes/[episodeId]/decisions/route'
import { POST as postHoldEnd } from '@/app/api/episodes/[episodeId]/holds/[holdId]/end/route'
import { POST as postHoldLook } from '@/app/api/episodes/[episodeId]/holds/[holdId]/observations/route'
import { GET as readHold, POST as postHold } from '@/app/api/episodes/[episodeId]/holds/route'
import { GET as readScreen, POST as postScreen } from '@/app/api/episodes/[episodeId]/screens/route'
import { POST as postTrialEnd } from '@/app/api/episodes/[episodeId]/trials/[trialId]/end/route'
import { POST as postTrialLook } from '@/app/api/episodes/[episodeId]/trials/[trialId]/observations/route'
import { GET as readTrial, POST as postTrial } from '@/app/api/episodes/[episodeId]/trials/route'
import { POST as postApproval } from '@/app/api/units/[unitId]/protocol/approve/route'
import { POST as postDraft } from '@/app/api/units/[unitId]/protocol/draft/route'
import { GET as readProtocol } from '@/app/api/units/[unitId]/protocol/route'
import { savePasswordHash } from '@/db/queries/sessions'
import { decisions, holds, screens, trialObservations, trials } from '@/db/schema'
import type { DecisionFormDto } from '@/lib/schemas/decisions'
import type { TrialFormDto } from '@/lib/schemas/trials'
import { hashNewPassword } from '@/lib/server/auth'
import { newId } from '@/lib/shared/ids'
import { HOUR_MS, localDay, MINUTE_MS } from '@/lib/shared/time'
import type { ErrorDto } from '@/lib/shared/errors'
import { makeWorld, type TestPerson } from '../helpers/factories'
import { ALL_SAFE, CALM, PROPOFOL, READY, withFio2Limit } from '../helpers/steps'
import { makeRequest, makeSession, routeParams, serveDatabase } from '../helpers/test-server'
import { at, countRows } from '../helpers/verb-checks'

type Handler = (request: Request, route: ReturnType<typeof routeParams>) => Promise<Response>
let world: ReturnType<typeof makeWorld>

// Routes use the real clock: the unit lies where it is noon now, so that no test crosses its midnight.
const hoursEast = 12 - new Date().getUTCHours()
const ZONE = `Etc/GMT${hoursEast > 0 ? '-' : '+'}${Math.abs(hoursEast)}`

beforeEach(() => {
  world = makeWorld()
  serveDatabase(world.db)
  world.db.$client.prepare('update units set time_zone = ?').run(ZONE)
  world.db.$client.prepare('update episodes set started_at = ?').run(Date.now() - 48 * HOUR_MS)
})

const ago = (minutes: number) => at(Date.now() - minutes * MINUTE_MS, ZONE)
const cookieFor = (person: TestPerson) => makeSession(world.db, person.id).cookie

async function send(handler: Handler, person: TestPerson | null, params: Record<string, string>, body: unknown, key = newId()) {
  const headers = { 'idempotency-key': key }
  const request = makeRequest('/api/x', { body, headers, ...(person ? { cookie: cookieFor(person) } : {}) })
  const response = await handler(request, routeParams(params))
  return {
    status: response.status,
    headers: response.headers,
    body: (await response.json()) as Record<string, unknown> & ErrorDto,
  }
}
async function fetchForm<Dto>(handler: Handler, person: TestPerson, params: Record<string, string>): Promise<Dto> {
  const response = await handler(makeRequest('/api/x', { method: 'GET', cookie: cookieFor(person) }), routeParams(params))
  expect(response.status).toBe(200)
  expect(response.headers.get('cache-control')).toBe('no-store')
  return (await response.json()) as Dto
}

const episode = () => ({ episodeId: world.episode.id })
const screenBody = (over: object = {}) => ({
  observed: ago(50),
  seenLatestId: null,
  excuse: null,
  note: null,
  readings: READY,
  ...over,
})
const holdBody = (over: object = {}) => ({
  observed: ago(45),
  seenLatestId: null,
  start: 'started',
  safety: ALL_SAFE,
  infusions: [PROPOFOL],
  note: null,
  ...over,
})
const trialBody = (over: object = {}) => ({
  observed: ago(35),
  seenLatestId: null,
  technique: 't_piece',
  pressureSupportCmH2O: null,
  peepCmH2O: null,
  fio2Fraction: 0.4,
  plannedDurationMin: 30,
  baseline: CALM,
  startedAnywayBecause: 'asked for at the bedside',
  ...over,
})

describe('a ventilator day over the API', () => {
  it('goes from screen to signed decision, each page showing what the others recorded', async () => {
    const password = 'a long enough sentence'
    savePasswordHash(world.db, {
      id: newId(),
      personId: world.physician.id,
      hash: await hashNewPassword(password),
      now: Date.now(),
    })
    expect(await send(postScreen, world.rt, episode(), screenBody())).toMatchObject({ status: 200, body: { result: 'ready' } })
    const hold = await send(postHold, world.nurse, episode(), holdBody())
    expect(hold.status).toBe(200)
    const ofHold = { ...episode(), holdId: String(hold.body.holdId) }
    const awake = { observed: ago(40), readings: { ...CALM, rass: -1 }, opensEyesToVoice: 'yes' }
    expect(await send(postHoldLook, world.nurse, ofHold, awake)).toMatchObject({ status: 200, body: { rulesMet: [] } })
    const ended = await send(postHoldEnd, world.nurse, ofHold, {
      observed: ago(38),
      outcome: 'tolerated',
      rulesMet: [],
      note: null,
    })
    expect(ended).toMatchObject({ status: 200, body: { outcome: 'tolerated', restarts: [] } })
    const trial = await send(postTrial, world.rt, episode(), trialBody({ startedAnywayBecause: null }))
    expect(trial.status).toBe(200)
    const ofTrial = { ...episode(), trialId: String(trial.body.trialId) }
    expect((await send(postTrialLook, world.nurse, ofTrial, { observed: ago(20), readings: CALM })).status).toBe(200)
    const running = await fetchForm<TrialFormDto>(readTrial, world.rt, episode())
    expect(running.running?.observations).toMatchObject([{ recordedByName: 'Noa Nurse', minute: 15 }])
    const passed = { observed: ago(4), outcome: 'passed', rulesMet: [], signs: [], returnedTo: '', reason: null }
    expect(await send(postTrialEnd, world.rt, ofTrial, passed)).toMatchObject({ status: 200, body: { outcome: 'passed' } })
    const form = await fetchForm<DecisionFormDto>(readDecision, world.physician, episode())
    expect(form).toMatchObject({
      move: { step: 'decide' },
      evidence: { screen: { result: 'ready' }, hold: { end: { outcome: 'tolerated' } }, trial: { end: { outcome: 'passed' } } },
    })
    const signed = await send(postDecision, world.physician, episode(), {
      seenLatestId: form.seenLatestId,
      seenEvidenceHash: form.evidenceHash,
      choice: 'extubate',
      reasons: [],
      lookAgain: null,
      supportAfter: 'oxygen',
      steroidsPlanned: null,
      note: null,
      password,
    })
    expect(signed.status).toBe(200)
    expect(world.db.select().from(decisions).all()).toMatchObject([{ choice: 'extubate', recordedBy: world.physician.id }])
  })

  it('drafts and approves a protocol', async () => {
    const unit = { unitId: world.medical.unit.id }
    const draft = await send(postDraft, world.lead, unit, {
      version: null,
      content: withFio2Limit(0.4),
      note: 'FiO2 at most 0.40',
    })
    expect(draft).toMatchObject({ status: 200, body: { number: 2, version: 1 } })
    const approved = await send(postApproval, world.physician, unit, {
      draftId: draft.body.id,
      version: 1,
      startDay: null,
      note: null,
    })
    expect(approved).toMatchObject({ status: 200, body: { number: 2 } })
    expect(await fetchForm(readProtocol, world.rt, unit)).toMatchObject({ current: { number: 2 }, past: [{ number: 1 }] })
  })
})

describe('what the edge refuses', () => {
  it('answers 422 with every wrong field, and records nothing', async () => {
    const before = countRows(world.db)['screens']
    const body = screenBody({
      observed: { day: 'today', time: '7.30' },
      readings: { ...READY, fio2Fraction: 50, peepCmH2O: 'eight' },
    })
    const answer = await send(postScreen, world.rt, episode(), body)
    expect(answer.status).toBe(422)
    expect(answer.body).toMatchObject({ code: 'INVALID', fields: { 'readings.fio2Fraction': 'FiO2 is a fraction here: 0.50?' } })
    expect(Object.keys(answer.body.fields ?? {}).sort()).toEqual([
      'observed.day',
      'observed.time',
      'readings.fio2Fraction',
      'readings.peepCmH2O',
    ])
    expect(countRows(world.db)['screens']).toBe(before)
  })

  it.each<[string, Handler, Record<string, string>]>([
    ['screen', postScreen, {}],
    ['hold', postHold, {}],
    ['hold observation', postHoldLook, { holdId: 'x' }],
    ['hold end', postHoldEnd, { holdId: 'x' }],
    ['trial', postTrial, {}],
    ['trial observation', postTrialLook, { trialId: 'x' }],
    ['trial end', postTrialEnd, { trialId: 'x' }],
    ['decision', postDecision, {}],
    ['draft', postDraft, { unitId: 'x' }],
    ['approval', postApproval, { unitId: 'x' }],
  ])('answers an empty %s form with 422 and fields, and without a session with 401', async (_name, handler, params) => {
    const empty = await send(handler, world.physician, { ...episode(), ...params }, {})
    expect(empty.status).toBe(422)
    expect(Object.keys(empty.body.fields ?? {}).length).toBeGreaterThan(0)
    expect((await send(handler, null, { ...episode(), ...params }, {})).status).toBe(401)
  })

  it('answers 403 to the wrong role and 404 outside the unit, on reads as on writes', async () => {
    expect((await send(postScreen, world.nurse, episode(), screenBody())).status).toBe(403)
    expect((await send(postHold, world.rt, episode(), holdBody())).status).toBe(403)
    expect((await send(postTrial, world.nurse, episode(), trialBody())).status).toBe(403)
    for (const handler of [readScreen, readHold, readTrial, readDecision]) {
      for (const person of [world.outsider, world.administrator]) {
        const response = await handler(
          makeRequest('/api/x', { method: 'GET', cookie: cookieFor(person) }),
          routeParams(episode()),
        )
        expect(response.status).toBe(404)
      }
    }
    expect((await send(postScreen, world.outsider, episode(), screenBody())).status).toBe(404)
  })

  it('takes the episode from the address, not from the body', async () => {
    const answer = await send(postScreen, world.rt, episode(), screenBody({ episodeId: 'another' }))
    expect(answer.status).toBe(200)
    expect(world.db.select().from(screens).all()).toMatchObject([
      { episodeId: world.episode.id, ventilatorDay: localDay(Date.now() - 50 * MINUTE_MS, ZONE) },
    ])
  })
})

describe('the same thing at the same moment', () => {
  it('lets one of eight starts of a trial in, sent together by two people', async () => {
    const cookies = [cookieFor(world.rt), cookieFor(world.physician)]
    const answers = await Promise.all(
      Array.from({ length: 8 }, (_, index) => {
        const cookie = cookies[index % 2] ?? ''
        const request = makeRequest('/api/x', {
          body: trialBody({ recordAnyway: true }),
          cookie,
          headers: { 'idempotency-key': newId() },
        })
        return postTrial(request, routeParams(episode()))
      }),
    )
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409, 409, 409, 409, 409, 409, 409])
    expect(world.db.select().from(trials).all()).toHaveLength(1)
  })

  it('lets one of two starts of a hold in', async () => {
    const cookie = cookieFor(world.nurse)
    const start = () =>
      postHold(
        makeRequest('/api/x', { body: holdBody(), cookie, headers: { 'idempotency-key': newId() } }),
        routeParams(episode()),
      )
    const answers = await Promise.all([start(), start()])
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409])
    expect(world.db.select().from(holds).all()).toHaveLength(1)
  })

  it('records a double tap once and gives both taps the same answer', async () => {
    const trial = await send(postTrial, world.rt, episode(), trialBody())
    const params = { ...episode(), trialId: String(trial.body.trialId) }
    const key = newId()
    const body = { observed: ago(20), readings: CALM }
    const [first, second] = await Promise.all([
      send(postTrialLook, world.rt, params, body, key),
      send(postTrialLook, world.rt, params, body, key),
    ])
    expect(first).toMatchObject({ status: 200 })
    expect(second.body).toEqual(first.body)
    expect(world.db.select().from(trialObservations).all()).toHaveLength(1)
  })
})
