import { beforeAll, describe, expect, it } from 'vitest'
import type { Db } from '@/db/client'
import { savePasswordHash } from '@/db/queries/sessions'
import { decisions } from '@/db/schema'
import { signDecisionSchema, type SignDecisionInput } from '@/lib/schemas/decisions'
import { hashNewPassword } from '@/lib/server/auth'
import { contentHash } from '@/lib/services/decisions/content-hash'
import { readDecisionForm } from '@/lib/services/decisions/read-form'
import { signDecision } from '@/lib/services/decisions/sign'
import { recordScreen } from '@/lib/services/screens/record'
import { endTrial } from '@/lib/services/trials/end'
import { observeTrial } from '@/lib/services/trials/observe'
import { AppError, type ErrorCode } from '@/lib/shared/errors'
import { newId } from '@/lib/shared/ids'
import { auditRows, makeCtx, makePerson, makeWorld, NOW, TODAY, type TestPerson } from '../../helpers/factories'
import { minute, onTrial, READY, screenInput, trialEnd, trialLook } from '../../helpers/steps'
import { at, dumpRows } from '../../helpers/verb-checks'

const PASSWORD = 'a long enough sentence'
let hash = ''
beforeAll(async () => {
  hash = await hashNewPassword(PASSWORD)
})

type World = ReturnType<typeof makeWorld>
const givePassword = (db: Db, person: TestPerson) => savePasswordHash(db, { id: newId(), personId: person.id, hash, now: NOW })

/** A passed trial from 07:20 to 07:50 with one look, and a physician with a password. */
function passedWorld(): World {
  const world = makeWorld()
  const { trialId } = onTrial(world)
  const ctx = makeCtx(world.db, world.rt)
  observeTrial(ctx, trialLook(world.episode.id, trialId, { observed: at(minute(-12)) }))
  endTrial(ctx, trialEnd(world.episode.id, trialId))
  givePassword(world.db, world.physician)
  return world
}

const formOf = (world: World, now = NOW) =>
  readDecisionForm(makeCtx(world.db, world.physician, now), { episodeId: world.episode.id })

function decision(world: World, over: Partial<SignDecisionInput> = {}): SignDecisionInput {
  const form = formOf(world)
  return signDecisionSchema.parse({
    episodeId: world.episode.id,
    amends: null,
    seenLatestId: form.seenLatestId,
    seenEvidenceHash: form.evidenceHash,
    choice: 'extubate',
    reasons: [],
    lookAgain: null,
    supportAfter: 'high_flow',
    steroidsPlanned: false,
    note: null,
    password: PASSWORD,
    ...over,
  })
}
const notToday = (world: World, over: Partial<SignDecisionInput> = {}) =>
  decision(world, {
    choice: 'not_today',
    reasons: ['secretions', 'mental_state'],
    lookAgain: { day: TODAY, time: '14:00' },
    supportAfter: null,
    steroidsPlanned: null,
    ...over,
  })
const rowsOf = (world: World) => world.db.select().from(decisions).all()

async function expectRefused(run: Promise<unknown>, code: ErrorCode, words: RegExp, field?: string): Promise<void> {
  const error: unknown = await run.then(
    () => null,
    (thrown: unknown) => thrown,
  )
  if (!(error instanceof AppError)) throw new Error(`It was not refused: ${String(error)}`)
  expect(error.code).toBe(code)
  expect(field === undefined ? error.message : (error.fields?.[field] ?? '')).toMatch(words)
}

describe('signDecision', () => {
  it('keeps choice, plan, evidence, statement and hash, at the moment of signing, and writes the audit row', async () => {
    const world = passedWorld()
    const now = NOW + 35_000
    const answer = await signDecision(makeCtx(world.db, world.physician, now), decision(world))
    const [row] = rowsOf(world)
    expect(row).toMatchObject({
      id: answer.id,
      choice: 'extubate',
      reasons: [],
      lookAgainAt: null,
      supportAfter: 'high_flow',
      steroidsPlanned: false,
      observedAt: now,
      recordedAt: now,
      ventilatorDay: TODAY,
      recordedBy: world.physician.id,
    })
    expect(row?.statement).toBe(
      'I have decided to extubate this patient, with high flow planned afterwards, without steroids. Signed by Parker Physician, physician, Medical ICU, at 08:00 on 3 Mar 2026.',
    )
    expect(row?.evidence).toMatchObject({
      screen: { result: 'ready', readings: READY },
      hold: { start: 'not_needed' },
      trial: { end: { outcome: 'passed' } },
    })
    expect(auditRows(world.db, 'decision.sign')).toMatchObject([{ subjectId: answer.id, actorId: world.physician.id }])
    const { reasons, lookAgainAt, supportAfter, steroidsPlanned, note } = row ?? {}
    const plan = { reasons, lookAgainAt, supportAfter, steroidsPlanned, note }
    expect(answer.contentHash).toBe(contentHash({ evidence: row?.evidence, choice: 'extubate', plan, statement: row?.statement }))
    expect(answer.contentHash).toMatch(/^[0-9a-f]{64}$/)
  })

  it('signs “not today” with its reasons and the time to look again', async () => {
    const world = passedWorld()
    const { statement } = await signDecision(
      makeCtx(world.db, world.physician),
      notToday(world, { note: 'thick secretions overnight' }),
    )
    expect(statement).toContain(
      'I have decided not to extubate this patient today (reasons: secretions, mental state), to look again at 14:00. Note: thick secretions overnight. Signed by',
    )
    expect(rowsOf(world)[0]?.lookAgainAt).toBe(minute(360))
  })

  it('refuses everyone but a physician of the unit, also with a right password', async () => {
    const world = passedWorld()
    for (const person of [world.rt, world.nurse, world.lead]) {
      givePassword(world.db, person)
      await expectRefused(signDecision(makeCtx(world.db, person), decision(world)), 'FORBIDDEN', /role/)
    }
    const elsewhere = makePerson(world.db, world.hospital.id, [{ unitId: world.surgical.unit.id, role: 'physician' }])
    givePassword(world.db, elsewhere)
    await expectRefused(signDecision(makeCtx(world.db, elsewhere), decision(world)), 'NOT_FOUND', /Not found/)
    await expectRefused(signDecision(makeCtx(world.db, world.administrator), decision(world)), 'NOT_FOUND', /Not found/)
    expect(rowsOf(world)).toHaveLength(0)
    expect(auditRows(world.db, 'access.denied')).toHaveLength(5)
  })

  it('refuses a wrong password at its field, signs nothing, and makes the fifth wrong one wait', async () => {
    const world = passedWorld()
    const ctx = makeCtx(world.db, world.physician)
    const wrong = decision(world, { password: 'something else entirely' })
    for (let tries = 0; tries < 5; tries += 1)
      await expectRefused(signDecision(ctx, wrong), 'INVALID', /not your password/, 'password')
    await expectRefused(signDecision(ctx, decision(world)), 'RATE_LIMITED', /./)
    expect(rowsOf(world)).toHaveLength(0)
  })

  it('keeps the password nowhere, neither in full nor in part of a stored input', async () => {
    const world = passedWorld()
    const ctx = makeCtx(world.db, world.physician, NOW, { idempotencyKey: newId() })
    const input = decision(world)
    await signDecision(ctx, input)
    expect(JSON.stringify(dumpRows(world.db))).not.toContain(PASSWORD)
    const { password: _password, ...rest } = input
    const { createHash } = await import('node:crypto')
    const [stored] = dumpRows(world.db)['idempotency_keys'] as { input_hash: string }[]
    expect(stored?.input_hash).toBe(createHash('sha256').update(JSON.stringify(rest)).digest('hex'))
  })

  it('signs a request that arrives twice once', async () => {
    const world = passedWorld()
    const ctx = makeCtx(world.db, world.physician, NOW, { idempotencyKey: newId() })
    const input = decision(world)
    const first = await signDecision(ctx, input)
    expect(await signDecision({ ...ctx, now: NOW + 5000 }, input)).toEqual(first)
    expect(rowsOf(world)).toHaveLength(1)
    expect(auditRows(world.db, 'decision.sign')).toHaveLength(1)
    await expectRefused(signDecision(ctx, { ...input, supportAfter: 'niv' }), 'CONFLICT', /other values/)
  })

  it('leaves nothing behind when the audit row cannot be written', async () => {
    const world = passedWorld()
    const input = decision(world)
    const before = dumpRows(world.db)
    world.db.$client.exec(`create temp trigger planned_fault before insert on audit_log when new.action = 'decision.sign'
      begin select raise(abort, 'planned fault'); end`)
    await expect(signDecision(makeCtx(world.db, world.physician), input)).rejects.toThrow('planned fault')
    world.db.$client.exec('drop trigger planned_fault')
    expect(rowsOf(world)).toEqual([])
    expect(dumpRows(world.db)['audit_log']).toEqual(before['audit_log'])
  })
})

describe('what a decision rests on', () => {
  it('is not signed when the record changed after the page showed it', async () => {
    const world = passedWorld()
    const input = decision(world)
    const trialId = formOf(world).evidence.trial?.entryId ?? ''
    observeTrial(makeCtx(world.db, world.nurse), trialLook(world.episode.id, trialId, { observed: at(minute(-11)) }))
    await expectRefused(signDecision(makeCtx(world.db, world.physician), input), 'CONFLICT', /record changed while you read it/)
    await signDecision(makeCtx(world.db, world.physician), decision(world))
    expect(rowsOf(world)).toHaveLength(1)
  })

  it('has one hash while nothing is recorded, whatever the time', () => {
    const world = passedWorld()
    expect(formOf(world, NOW + 60 * 60_000).evidenceHash).toBe(formOf(world).evidenceHash)
  })

  it('waits for the end of a running trial before extubation, not before another decision', async () => {
    const world = makeWorld()
    onTrial(world)
    givePassword(world.db, world.physician)
    await expectRefused(signDecision(makeCtx(world.db, world.physician), decision(world)), 'PRECONDITION', /trial is running/)
    await signDecision(makeCtx(world.db, world.physician), notToday(world))
    expect(rowsOf(world)).toHaveLength(1)
  })

  it('is not signed after ventilation ended', async () => {
    const world = passedWorld()
    const input = decision(world)
    world.db.$client.prepare('update episodes set ended_at = ?, end = ?').run(minute(-1), 'self_extubated')
    await expectRefused(signDecision(makeCtx(world.db, world.physician), input), 'PRECONDITION', /ended at 07:59/)
  })

  it('is signed without a trial, on what there is', async () => {
    const world = makeWorld()
    givePassword(world.db, world.physician)
    const input = decision(world, { choice: 'comfort_extubation', supportAfter: null, steroidsPlanned: null })
    await signDecision(makeCtx(world.db, world.physician), input)
    expect(rowsOf(world)[0]?.evidence).toMatchObject({ screen: null, hold: null, trial: null, rsbi: null })
  })
})

describe('the time to look again', () => {
  it.each([
    ['a time that is past', { day: TODAY, time: '07:59' }, 'lookAgain.time', /past. It is 08:00 now/],
    ['a time more than 7 days away', { day: '2026-03-11', time: '08:00' }, 'lookAgain.day', /more than 7 days/],
    ['the hour that the clocks skip', { day: '2026-03-08', time: '02:30' }, 'lookAgain.time', /did not exist/],
    ['a day that does not exist', { day: '2026-02-30', time: '08:00' }, 'lookAgain.day', /does not exist/],
  ])('refuses %s', async (_title, lookAgain, field, words) => {
    const world = passedWorld()
    await expectRefused(signDecision(makeCtx(world.db, world.physician), notToday(world, { lookAgain })), 'INVALID', words, field)
    expect(rowsOf(world)).toHaveLength(0)
  })
})

describe('two physicians', () => {
  it('shows the second one the first one’s decision, and signs the second on request', async () => {
    const world = passedWorld()
    const second = makePerson(world.db, world.hospital.id, [{ unitId: world.medical.unit.id, role: 'physician' }])
    givePassword(world.db, second)
    const input = decision(world)
    await signDecision(makeCtx(world.db, world.physician), notToday(world))
    await expectRefused(
      signDecision(makeCtx(world.db, second), input),
      'CONFLICT',
      /Parker Physician recorded a decision.*08:00: not today/,
    )
    await signDecision(makeCtx(world.db, second), { ...input, recordAnyway: true })
    expect(rowsOf(world).map(({ choice }) => choice)).toEqual(['not_today', 'extubate'])
  })

  it('lets only one amendment of a version in; the signed one stays as it was', async () => {
    const world = passedWorld()
    const ctx = makeCtx(world.db, world.physician)
    const first = await signDecision(ctx, notToday(world))
    const before = rowsOf(world)[0]
    const amend = () => notToday(world, { reasons: ['cuff_leak'], amends: { id: first.id, reason: 'wrong reason ticked' } })
    await signDecision(ctx, amend())
    await expectRefused(signDecision(ctx, amend()), 'CONFLICT', /in the meantime/)
    expect(rowsOf(world)[0]).toEqual(before)
    expect(rowsOf(world)[1]).toMatchObject({ entryId: first.id, entryVersion: 2, reasons: ['cuff_leak'] })
    expect(formOf(world).decisions).toMatchObject([{ entryVersion: 2, isAmended: true }])
  })
})

describe('readDecisionForm', () => {
  it('brings the evidence together and names what is missing', () => {
    const world = passedWorld()
    const form = formOf(world)
    expect(form.evidence.rsbi).toMatchObject({ value: { known: true, value: 50 }, from: 'trial', observedAt: minute(-12) })
    expect(form.missing).toEqual(['settings', 'gas', 'cough', 'secretions'])
    expect(form).toMatchObject({
      isTrialRunning: false,
      decisions: [],
      amending: null,
      signerName: 'Parker Physician',
      may: { sign: true },
    })
    expect(readDecisionForm(makeCtx(world.db, world.rt), { episodeId: world.episode.id }).may).toEqual({ sign: false })
  })

  it('takes the evidence of the day before while nothing is recorded today', () => {
    const world = passedWorld()
    const evidence = formOf(world, NOW + 17 * 3_600_000).evidence
    expect(evidence).toMatchObject({ ventilatorDay: TODAY, trial: { end: { outcome: 'passed' } } })
    expect(formOf(world, NOW + 41 * 3_600_000).evidence).toMatchObject({ screen: null, trial: null })
  })

  it('starts the day’s evidence anew with the first entry of the day', () => {
    const world = passedWorld()
    const nextMorning = NOW + 22 * 3_600_000
    expect(formOf(world, nextMorning).evidence.trial).not.toBeNull()
    recordScreen(
      makeCtx(world.db, world.rt, nextMorning),
      screenInput(world.episode.id, { observed: at(nextMorning - 300_000), recordAnyway: true }),
    )
    expect(formOf(world, nextMorning).evidence).toMatchObject({
      ventilatorDay: '2026-03-04',
      screen: { result: 'ready' },
      hold: null,
      trial: null,
      rsbi: null,
    })
  })
})

describe('signDecisionSchema', () => {
  const base = {
    episodeId: 'e',
    amends: null,
    seenLatestId: null,
    seenEvidenceHash: 'h',
    reasons: [],
    lookAgain: null,
    supportAfter: null,
    steroidsPlanned: null,
    note: null,
    password: 'p',
  }
  const later = { day: TODAY, time: '14:00' }
  const fieldsOf = (over: object) =>
    signDecisionSchema.safeParse({ ...base, ...over }).error?.issues.map((issue) => issue.path.join('.')) ?? []
  it.each([
    ['nothing chosen', {}, ['choice']],
    ['not today without reasons or time', { choice: 'not_today' }, ['reasons', 'lookAgain']],
    ['not today for another reason without words', { choice: 'not_today', reasons: ['other'], lookAgain: later }, ['note']],
    [
      'not today with support afterwards',
      { choice: 'not_today', reasons: ['secretions'], lookAgain: later, supportAfter: 'niv' },
      ['supportAfter'],
    ],
    ['extubate without support', { choice: 'extubate' }, ['supportAfter']],
    ['extubate with reasons against it', { choice: 'extubate', supportAfter: 'oxygen', reasons: ['secretions'] }, ['reasons']],
    ['extubate with a time to look again', { choice: 'extubate', supportAfter: 'oxygen', lookAgain: later }, ['lookAgain']],
    ['no password', { choice: 'comfort_extubation', password: '' }, ['password']],
  ])('refuses %s', (_title, over, fields) => {
    expect(fieldsOf(over)).toEqual(fields)
  })
  it('takes the tracheostomy pathway alone', () => {
    expect(fieldsOf({ choice: 'tracheostomy_pathway' })).toEqual([])
  })
})

describe('contentHash', () => {
  it('does not depend on the order of keys, and depends on every value', () => {
    expect(contentHash({ a: 1, b: [{ c: null, d: 'x' }] })).toBe(contentHash({ b: [{ d: 'x', c: null }], a: 1 }))
    expect(contentHash({ a: [1, 2] })).not.toBe(contentHash({ a: [2, 1] }))
    expect(contentHash({ a: null })).not.toBe(contentHash({}))
    expect(contentHash({ a: undefined })).toBe(contentHash({}))
  })
})
