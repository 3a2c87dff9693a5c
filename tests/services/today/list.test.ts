import { eq } from 'drizzle-orm'
import { describe, expect, it, vi } from 'vitest'
import { GET } from '@/app/api/units/[unitId]/today/route'
import {
  decisions,
  episodes,
  holdEnds,
  holdObservations,
  holds,
  protocolVersions,
  screens,
  stays,
  trialEnds,
  trialObservations,
  trials,
} from '@/db/schema'
import { KEPT_FOR_MS } from '@/lib/services/today/kept-today'
import { listToday } from '@/lib/services/today/list'
import { readDayRecord, readNextMove } from '@/lib/services/today/read-next-move'
import { HOUR_MS, MINUTE_MS } from '@/lib/shared/time'
import { defaultProtocol } from '@/lib/weaning/published/default-protocol'
import type { ObservedReadings } from '@/lib/weaning/readings'
import { addPassedTrial, addScreen } from '../../helpers/day'
import {
  entryPlace,
  makeAdmitted,
  makeCtx,
  makeEpisode,
  makeJobCtx,
  makeSettings,
  makeUnit,
  makeWorld,
  NOW,
  TODAY,
} from '../../helpers/factories'
import { makeRequest, makeSession, routeParams, serveDatabase } from '../../helpers/test-server'
import { expectDoor } from '../../helpers/verb-checks'

type World = ReturnType<typeof makeWorld>
const CALM: ObservedReadings = {
  breathsPerMin: 18,
  tidalVolumeMl: 420,
  spo2Percent: 96,
  heartRatePerMin: 84,
  systolicMmHg: 124,
  diastolicMmHg: 70,
  rass: 0,
  paCO2MmHg: null,
  paO2MmHg: null,
  ph: null,
  signs: [],
}
const today = (world: World, now = NOW) => listToday(makeCtx(world.db, world.rt, now), { unitId: world.medical.unit.id })
const onlyRow = (world: World, now = NOW) => {
  const [row, ...others] = today(world, now).rows
  if (!row || others.length > 0) throw new Error('not one row')
  return row
}
function startTrial(world: World, startedAt: number, over: Partial<typeof trials.$inferInsert> = {}) {
  return world.db
    .insert(trials)
    .values({
      ...entryPlace(world.episode, world.place, startedAt),
      technique: 't_piece',
      fio2Fraction: 0.4,
      plannedDurationMin: 30,
      baseline: CALM,
      ...over,
    })
    .returning()
    .get()
}
function look(world: World, trialId: string, atMs: number, readings: Partial<ObservedReadings>) {
  world.db
    .insert(trialObservations)
    .values({ ...entryPlace(world.episode, world.place, atMs), trialId, readings: { ...CALM, ...readings } })
    .run()
}
function startHold(world: World, startedAt: number, over: Partial<typeof holds.$inferInsert> = {}) {
  return world.db
    .insert(holds)
    .values({ ...entryPlace(world.episode, world.place, startedAt), start: 'started', infusions: [], ...over })
    .returning()
    .get()
}

describe('listToday', () => {
  it('shows the patient, the settings last observed, the day track’s axis and the one next move', () => {
    const world = makeWorld()
    makeSettings(world.db, world.episode, world.place, { observedAt: NOW - 3 * HOUR_MS, peepCmH2O: 10 })
    makeSettings(world.db, world.episode, world.place, { observedAt: NOW - 2 * HOUR_MS, recordedAt: NOW - HOUR_MS, peepCmH2O: 7 })
    const dto = today(world)
    expect(dto).toMatchObject({
      day: TODAY,
      nowMs: NOW,
      trackFromMs: NOW - 4 * HOUR_MS,
      trackToMs: NOW + 12 * HOUR_MS,
      emptyBeds: ['M02', 'M03', 'M04'],
    })
    expect(onlyRow(world)).toMatchObject({
      patientId: world.patient.id,
      episodeId: world.episode.id,
      bedLabel: 'M01',
      ventilatorDayNumber: 3,
      airway: 'endotracheal_tube',
      settings: { mode: 'PC-CSV', fio2Fraction: 0.4, peepCmH2O: 7, observedAtMs: NOW - 2 * HOUR_MS },
      move: { kind: 'move', step: 'screen', role: 'rt', dueMs: NOW + HOUR_MS, isOverdue: false },
      moveHref: `/episodes/${world.episode.id}/screen`,
      endedAtMs: null,
      excuse: null,
    })
  })

  it('asks the database the same number of questions for one patient as for twelve', () => {
    const world = makeWorld()
    const large = makeUnit(world.db, world.hospital.id, { bedCount: 12 })
    for (const bed of large.beds) {
      const { episode } = makeAdmitted(world.db, {
        unit: large.unit,
        bed,
        protocolVersionId: large.protocolVersion.id,
        by: world.rt.id,
      })
      makeSettings(world.db, episode, {
        unitId: large.unit.id,
        protocolVersionId: large.protocolVersion.id,
        recordedBy: world.rt.id,
      })
    }
    const reader = {
      ...world.rt,
      memberships: [world.medical, large].map(({ unit }) => ({ unitId: unit.id, role: 'rt' as const })),
    }
    const count = (unitId: string) => {
      const statement: unknown = Object.getPrototypeOf(world.db.$client.prepare('select 1'))
      const spies = (['all', 'get', 'run', 'iterate'] as const).map((name) =>
        vi.spyOn(statement as Record<typeof name, () => unknown>, name),
      )
      const rows = listToday(makeCtx(world.db, reader), { unitId }).rows.length
      const asked = spies.reduce((sum, spy) => sum + spy.mock.calls.length, 0)
      for (const spy of spies) spy.mockRestore()
      return { rows, asked }
    }
    const small = count(world.medical.unit.id)
    expect(small.rows).toBe(1)
    expect(small.asked).toBeGreaterThan(5)
    expect(count(large.unit.id)).toEqual({ rows: 12, asked: small.asked })
  })

  it('counts where the unit stands', () => {
    const world = makeWorld()
    const place = (index: number) => {
      const bed = world.medical.beds[index]
      if (!bed) throw new Error('no bed')
      return makeAdmitted(world.db, {
        unit: world.medical.unit,
        bed,
        protocolVersionId: world.medical.protocolVersion.id,
        by: world.rt.id,
      }).episode
    }
    addScreen(world.db, world.episode, world.place, { result: 'ready', observedAt: NOW - 2 * HOUR_MS })
    startHold(world, NOW - 100 * MINUTE_MS)
    const onTrial = place(1)
    addScreen(world.db, onTrial, world.place, { result: 'ready', observedAt: NOW - 2 * HOUR_MS })
    world.db
      .insert(trials)
      .values({
        ...entryPlace(onTrial, world.place, NOW - 10 * MINUTE_MS),
        technique: 't_piece',
        fio2Fraction: 0.4,
        plannedDurationMin: 30,
        baseline: CALM,
      })
      .run()
    const passed = place(2)
    addScreen(world.db, passed, world.place, { result: 'ready', observedAt: NOW - 3 * HOUR_MS })
    addPassedTrial(world.db, passed, world.place, { startedAt: NOW - 150 * MINUTE_MS, endedAt: NOW - 2 * HOUR_MS })
    const incomplete = place(3)
    addScreen(world.db, incomplete, world.place, { result: 'incomplete', observedAt: NOW - HOUR_MS })
    const { counts, rows } = today(world)
    expect(rows.map((row) => (row.move.kind === 'move' ? row.move.step : row.move.reason.code))).toEqual([
      'observe_hold',
      'observe_trial',
      'decide',
      'complete_screen',
    ])
    // Overdue: the hold's look (30 min after its start), the trial's look at 5 min, the decision (60 min after the pass).
    expect(counts).toEqual({ ventilated: 4, screened: 3, ready: 3, onHold: 1, onTrial: 1, decisionsOwed: 1, overdue: 3 })
  })

  it('draws the day track from what belongs to the day', () => {
    const world = makeWorld()
    addScreen(world.db, world.episode, world.place, { result: 'not_ready', observedAt: NOW - 26 * HOUR_MS })
    addScreen(world.db, world.episode, world.place, { result: 'ready', observedAt: NOW - 3 * HOUR_MS })
    const hold = startHold(world, NOW - 170 * MINUTE_MS)
    world.db
      .insert(holdEnds)
      .values({
        ...entryPlace(world.episode, world.place, NOW - 2 * HOUR_MS),
        holdId: hold.id,
        outcome: 'tolerated',
        rulesMet: [],
        restarts: [],
      })
      .run()
    const trial = startTrial(world, NOW - 100 * MINUTE_MS)
    look(world, trial.id, NOW - 95 * MINUTE_MS, {})
    world.db
      .insert(trialEnds)
      .values({
        ...entryPlace(world.episode, world.place, NOW - 70 * MINUTE_MS),
        trialId: trial.id,
        outcome: 'passed',
        rulesMet: [],
        returnedTo: 'x',
      })
      .run()
    world.db
      .insert(decisions)
      .values({
        ...entryPlace(world.episode, world.place, NOW - HOUR_MS),
        choice: 'extubate',
        reasons: [],
        evidence: {},
        contentHash: 'h',
        statement: 's',
      })
      .run()
    expect(onlyRow(world).track).toEqual({
      screens: [{ atMs: NOW - 3 * HOUR_MS, result: 'ready' }],
      holds: [{ startMs: NOW - 170 * MINUTE_MS, endMs: NOW - 2 * HOUR_MS, start: 'started', outcome: 'tolerated' }],
      pairingWindow: { startMs: NOW - 170 * MINUTE_MS, endMs: NOW - 50 * MINUTE_MS },
      trials: [
        {
          startMs: NOW - 100 * MINUTE_MS,
          endMs: NOW - 70 * MINUTE_MS,
          outcome: 'passed',
          observationsMs: [NOW - 95 * MINUTE_MS],
        },
      ],
      decisions: [{ atMs: NOW - HOUR_MS, choice: 'extubate' }],
    })
    expect(onlyRow(world).move).toMatchObject({ step: 'extubate', role: 'rt' })
  })

  it('still shows a trial and a hold that someone forgot to end days ago', () => {
    const world = makeWorld()
    startTrial(world, NOW - 40 * HOUR_MS - 24 * HOUR_MS)
    expect(onlyRow(world)).toMatchObject({ move: { step: 'end_trial', isOverdue: true }, track: { trials: [{ endMs: null }] } })
    const other = makeWorld()
    startHold(other, NOW - 64 * HOUR_MS)
    expect(onlyRow(other).move).toMatchObject({ step: 'end_hold', role: 'nurse' })
  })

  it('judges a running trial by its looks: a rule met makes its end the next move', () => {
    const world = makeWorld()
    const trial = startTrial(world, NOW - 20 * MINUTE_MS)
    look(world, trial.id, NOW - 15 * MINUTE_MS, { breathsPerMin: 38 })
    expect(onlyRow(world).move).toMatchObject({ step: 'observe_trial' })
    look(world, trial.id, NOW - 10 * MINUTE_MS, { breathsPerMin: 38 })
    expect(onlyRow(world).move).toMatchObject({
      step: 'end_trial',
      role: 'rt',
      isOverdue: true,
      why: { code: 'trial_limit_met' },
    })
  })

  it('judges a running trial by the protocol version that it began under', () => {
    const world = makeWorld()
    const trial = startTrial(world, NOW - 20 * MINUTE_MS)
    look(world, trial.id, NOW - 15 * MINUTE_MS, { breathsPerMin: 38 })
    look(world, trial.id, NOW - 10 * MINUTE_MS, { breathsPerMin: 38 })
    world.db
      .insert(protocolVersions)
      .values({
        id: 'v2',
        unitId: world.medical.unit.id,
        number: 2,
        content: { ...defaultProtocol, trial: { ...defaultProtocol.trial, stopRules: [] } },
        note: 'n',
        draftedAt: NOW - MINUTE_MS,
        approvedAt: NOW - MINUTE_MS,
        approvedBy: world.physician.id,
        startsAt: NOW - MINUTE_MS,
      })
      .run()
    expect(onlyRow(world).move).toMatchObject({ step: 'end_trial', why: { code: 'trial_limit_met' } })
    const { id, ...columns } = entryPlace(world.episode, { ...world.place, protocolVersionId: 'v2' }, NOW - 20 * MINUTE_MS)
    world.db
      .insert(trials)
      .values({
        ...columns,
        id,
        entryId: trial.entryId,
        entryVersion: 2,
        supersedesId: trial.id,
        amendReason: 'x',
        technique: 't_piece',
        fio2Fraction: 0.4,
        plannedDurationMin: 30,
        baseline: CALM,
      })
      .run()
    expect(onlyRow(world).move).toMatchObject({ step: 'observe_trial' })
  })

  it('counts only current versions and nothing that was withdrawn', () => {
    const world = makeWorld()
    const first = addScreen(world.db, world.episode, world.place, { result: 'ready', observedAt: NOW - 2 * HOUR_MS })
    const { id, ...columns } = entryPlace(world.episode, world.place, NOW - 2 * HOUR_MS)
    world.db
      .insert(screens)
      .values({
        ...columns,
        id,
        entryId: first.entryId,
        entryVersion: 2,
        supersedesId: first.id,
        amendReason: 'x',
        result: 'not_ready',
        verdict: {
          result: 'not_ready',
          ruleSet: 'r',
          criteria: [{ criterion: 'fio2', mark: 'not_met', value: 0.6, unknownBecause: null }],
        },
      })
      .run()
    expect(onlyRow(world).move).toEqual({ kind: 'none', reason: { code: 'not_ready', criteria: ['fio2'] } })
    const third = entryPlace(world.episode, world.place, NOW - 2 * HOUR_MS)
    world.db
      .insert(screens)
      .values({
        ...third,
        entryId: first.entryId,
        entryVersion: 3,
        supersedesId: id,
        amendReason: 'other patient',
        isWithdrawn: true,
        result: 'ready',
      })
      .run()
    expect(onlyRow(world)).toMatchObject({ move: { step: 'screen' }, track: { screens: [] } })
  })

  it('takes a trial as running again when its end was withdrawn', () => {
    const world = makeWorld()
    const trial = startTrial(world, NOW - 60 * HOUR_MS)
    const end = entryPlace(world.episode, world.place, NOW - 59 * HOUR_MS)
    const ended = { trialId: trial.id, outcome: 'passed' as const, rulesMet: [], returnedTo: 'x' }
    world.db
      .insert(trialEnds)
      .values({ ...end, ...ended })
      .run()
    expect(onlyRow(world).move).toMatchObject({ step: 'screen' })
    const second = entryPlace(world.episode, world.place, NOW - 59 * HOUR_MS)
    world.db
      .insert(trialEnds)
      .values({
        ...second,
        ...ended,
        entryId: end.entryId,
        entryVersion: 2,
        supersedesId: end.id,
        amendReason: 'x',
        isWithdrawn: true,
      })
      .run()
    expect(onlyRow(world).move).toMatchObject({ step: 'end_trial' })
  })

  it('keeps a promise to look again today that was signed days ago, unless something was tried since', () => {
    const world = makeWorld()
    world.db
      .update(episodes)
      .set({ startedAt: NOW - 120 * HOUR_MS })
      .run()
    const lookAgainAt = NOW + 2 * HOUR_MS
    world.db
      .insert(decisions)
      .values({
        ...entryPlace(world.episode, world.place, NOW - 72 * HOUR_MS),
        choice: 'not_today',
        reasons: ['fluid_overload'],
        lookAgainAt,
        evidence: {},
        contentHash: 'h',
        statement: 's',
      })
      .run()
    addScreen(world.db, world.episode, world.place, { result: 'not_ready', observedAt: NOW - HOUR_MS })
    expect(onlyRow(world).move).toMatchObject({ kind: 'move', step: 'decide_again', role: 'physician', dueMs: lookAgainAt })
    addPassedTrial(world.db, world.episode, world.place, { startedAt: NOW - 50 * HOUR_MS, endedAt: NOW - 49 * HOUR_MS })
    expect(onlyRow(world).move).toMatchObject({ kind: 'none', reason: { code: 'not_ready' } })
  })

  it('lets a later decision replace an earlier promise', () => {
    const world = makeWorld()
    const sign = (signedAt: number, lookAgainAt: number) =>
      world.db
        .insert(decisions)
        .values({
          ...entryPlace(world.episode, world.place, signedAt),
          choice: 'not_today',
          reasons: ['fluid_overload'],
          lookAgainAt,
          evidence: {},
          contentHash: 'h',
          statement: 's',
        })
        .run()
    sign(NOW - 46 * HOUR_MS, NOW + HOUR_MS)
    sign(NOW - 40 * HOUR_MS, NOW + 48 * HOUR_MS)
    addScreen(world.db, world.episode, world.place, { result: 'not_ready', observedAt: NOW - HOUR_MS })
    expect(onlyRow(world).move).toMatchObject({ kind: 'none', reason: { code: 'not_ready' } })
  })

  it('takes up before the window what yesterday left open, and leaves it once the window is open', () => {
    const world = makeWorld()
    const midnight = NOW - 8 * HOUR_MS
    addScreen(world.db, world.episode, world.place, { result: 'ready', observedAt: midnight - 5 * HOUR_MS })
    addPassedTrial(world.db, world.episode, world.place, { startedAt: midnight - 3 * HOUR_MS, endedAt: midnight - 2 * HOUR_MS })
    expect(onlyRow(world, midnight + HOUR_MS)).toMatchObject({ move: { step: 'decide', isOverdue: true }, track: { trials: [] } })
    expect(onlyRow(world, midnight + 5 * HOUR_MS).move).toMatchObject({ step: 'screen' })
  })

  it('keeps a patient on the list for 72 h after ventilation ended, while in the unit', () => {
    const world = makeWorld()
    const endedAt = NOW - 30 * HOUR_MS
    world.db.update(episodes).set({ endedAt, end: 'extubated' }).run()
    expect(onlyRow(world)).toMatchObject({
      endedAtMs: endedAt,
      ventilatorDayNumber: 2,
      move: { kind: 'none', reason: { code: 'episode_ended', end: 'extubated', atMs: endedAt } },
    })
    expect(today(world).counts).toMatchObject({ ventilated: 0, overdue: 0 })
    expect(today(world, endedAt + 72 * HOUR_MS).rows).toHaveLength(1)
    expect(today(world, endedAt + 72 * HOUR_MS + KEPT_FOR_MS).rows).toEqual([])
    world.db.update(stays).set({ endedAt: NOW, end: 'left_unit' }).run()
    expect(today(world).rows).toEqual([])
  })

  it('lists a patient who is ventilated again once, with the present episode', () => {
    const world = makeWorld()
    world.db
      .update(episodes)
      .set({ endedAt: NOW - 10 * HOUR_MS, end: 'extubated' })
      .run()
    const again = makeEpisode(
      world.db,
      { ...world.place, patientId: world.patient.id },
      { startedAt: NOW - 5 * HOUR_MS, start: 'reintubated' },
    )
    expect(onlyRow(world)).toMatchObject({ episodeId: again.id, ventilatorDayNumber: 1, endedAtMs: null })
  })

  it('does not show an entry of another patient on a row', () => {
    const world = makeWorld()
    const bed = world.medical.beds[1]
    if (!bed) throw new Error('no bed')
    const other = makeAdmitted(world.db, {
      unit: world.medical.unit,
      bed,
      protocolVersionId: world.medical.protocolVersion.id,
      by: world.rt.id,
    })
    addScreen(world.db, other.episode, world.place, { result: 'ready', observedAt: NOW - HOUR_MS })
    makeSettings(world.db, other.episode, world.place, { peepCmH2O: 12 })
    const [first, second] = today(world).rows
    expect(first).toMatchObject({ patientId: world.patient.id, settings: null, track: { screens: [] }, move: { step: 'screen' } })
    expect(second).toMatchObject({ patientId: other.patient.id, settings: { peepCmH2O: 12 }, move: { step: 'hold' } })
  })

  it('gives the reason why nobody owes anything: excused', () => {
    const world = makeWorld()
    world.db
      .insert(screens)
      .values({ ...entryPlace(world.episode, world.place, NOW - HOUR_MS), result: 'excused', excuse: 'prone' })
      .run()
    expect(onlyRow(world)).toMatchObject({
      excuse: 'prone',
      moveHref: null,
      move: { kind: 'none', reason: { code: 'excused', excuse: 'prone' } },
    })
    expect(today(world).counts).toMatchObject({ screened: 1, ready: 0 })
  })

  it('reads a hold with its looks', () => {
    const world = makeWorld()
    addScreen(world.db, world.episode, world.place, { result: 'ready', observedAt: NOW - 2 * HOUR_MS })
    const hold = startHold(world, NOW - HOUR_MS, { safety: { raised_icp: false, active_seizures: true } })
    world.db
      .insert(holdObservations)
      .values({
        ...entryPlace(world.episode, world.place, NOW - 20 * MINUTE_MS),
        holdId: hold.id,
        readings: CALM,
        opensEyesToVoice: 'yes',
      })
      .run()
    expect(readDayRecord(world.db, { ...world, unit: world.medical.unit }, NOW).holds).toEqual([
      {
        ventilatorDay: TODAY,
        start: 'started',
        startedMs: NOW - HOUR_MS,
        unsafeBecause: ['active_seizures'],
        lastObservedMs: NOW - 20 * MINUTE_MS,
        failRulesMet: [],
        failRulesMetMs: null,
        opensEyesMs: NOW - 20 * MINUTE_MS,
        endedMs: null,
        outcome: null,
      },
    ])
  })

  it('refuses people of another unit and an administrator; lets a job of the program pass', () => {
    const world = makeWorld()
    const input = { unitId: world.medical.unit.id }
    expectDoor(world, listToday, input, null)
    expectDoor({ db: world.db, outsider: world.administrator }, listToday, input, null)
    expect(listToday(makeJobCtx(world.db, 'mail.queue-due'), input).rows).toHaveLength(1)
  })

  it('answers through its route', async () => {
    const world = makeWorld()
    serveDatabase(world.db)
    const { cookie } = makeSession(world.db, world.lead.id)
    const response = await GET(makeRequest('/api/x', { method: 'GET', cookie }), routeParams({ unitId: world.medical.unit.id }))
    expect(response.headers.get('cache-control')).toBe('no-store')
    expect(await response.json()).toMatchObject({ rows: [{ bedLabel: 'M01' }] })
  })
})

describe('readNextMove', () => {
  it('is the move that Today shows, also inside the transaction that changes it', () => {
    const world = makeWorld()
    const found = { episode: world.episode, patient: world.patient, unit: world.medical.unit }
    expect(readNextMove(world.db, found, NOW)).toEqual(onlyRow(world).move)
    world.db.transaction((tx) => {
      tx.insert(screens)
        .values({
          ...entryPlace(world.episode, world.place, NOW - HOUR_MS),
          result: 'ready',
          verdict: { result: 'ready', criteria: [], ruleSet: 'r' },
        })
        .run()
      expect(readNextMove(tx, found, NOW)).toMatchObject({ step: 'hold' })
    })
    expect(world.db.select().from(screens).where(eq(screens.episodeId, world.episode.id)).all()).toHaveLength(1)
  })
})
