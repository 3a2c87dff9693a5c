import { describe, expect, it } from 'vitest'
import { GET } from '@/app/api/patients/[patientId]/route'
import { decisions, episodes, patients, screens, trialObservations, trials } from '@/db/schema'
import { readPatient } from '@/lib/services/patients/read'
import { recordSettings } from '@/lib/services/settings/record'
import { HOUR_MS, MINUTE_MS } from '@/lib/shared/time'
import type { ObservedReadings, ScreenReadings } from '@/lib/weaning/readings'
import {
  auditRows,
  entryPlace,
  makeCtx,
  makeEpisode,
  makeGas,
  makePatient,
  makeSettings,
  makeStay,
  makeWorld,
  NOW,
  TODAY,
} from '../../helpers/factories'
import { makeRequest, makeSession, routeParams, serveDatabase } from '../../helpers/test-server'
import { at, expectDoor, expectRefusal } from '../../helpers/verb-checks'

type World = ReturnType<typeof makeWorld>
const read = (world: World, person = world.rt, over: { episodeId?: string } = {}, now = NOW) =>
  readPatient(makeCtx(world.db, person, now), { patientId: world.patient.id, ...over })

const OBSERVED: ObservedReadings = {
  breathsPerMin: 20,
  tidalVolumeMl: 400,
  spo2Percent: 95,
  heartRatePerMin: 88,
  systolicMmHg: 126,
  diastolicMmHg: 70,
  rass: 0,
  paCO2MmHg: null,
  paO2MmHg: null,
  ph: null,
  signs: [],
}
const SCREENED: ScreenReadings = {
  fio2Fraction: 0.4,
  peepCmH2O: 5,
  norepinephrineMcgPerKgMin: 0,
  otherVasopressor: false,
  ischaemia: false,
  spo2Percent: 79,
  paO2MmHg: null,
  paO2FiO2Fraction: null,
  ph: null,
  spontaneousEffort: null,
  cough: null,
  secretions: null,
  rass: null,
  raisedIcp: null,
  neuromuscularBlockade: null,
  temperatureC: null,
  haemoglobinGPerDl: null,
  causeImproving: null,
  breathsPerMin: 24,
  tidalVolumeMl: 480,
  rsbiCondition: 'pressure_support',
}
function addScreen(world: World, observedAt: number, recordedAt = observedAt) {
  return world.db
    .insert(screens)
    .values({
      ...entryPlace(world.episode, world.place, observedAt, recordedAt),
      result: 'ready',
      readings: SCREENED,
      verdict: { result: 'ready', criteria: [], ruleSet: 'r1' },
    })
    .returning()
    .get()
}

describe('readPatient', () => {
  it('brings the patient, the stay, the episode and the present day together', () => {
    const world = makeWorld()
    const page = read(world)
    expect(page.patient).toMatchObject({
      familyName: world.patient.familyName,
      ageYears: 64,
      isAdult: true,
      heightCm: 180,
      unlikely: [],
    })
    // 50 + 0.91 × (180 − 152.4); ARDS Network 2000.
    expect(page.predictedBodyWeightKg).toEqual({ known: true, value: expect.closeTo(75.116, 6) as number })
    expect(page.stay).toMatchObject({ id: world.stay.id, bedLabel: 'M01', endedAt: null })
    expect(page.episode).toMatchObject({ id: world.episode.id, start: 'intubated', version: 1 })
    expect(page).toMatchObject({
      ventilatorDayNumber: 3,
      today: TODAY,
      isOpening: false,
      openUntil: null,
      earlierEpisodes: [],
      moveHref: `/episodes/${world.episode.id}/screen`,
      move: { kind: 'move', step: 'screen', role: 'rt' },
    })
    expect(page.trackFromMs).toBe(NOW - 4 * HOUR_MS)
    expect(page.trackToMs).toBe(NOW + 12 * HOUR_MS)
    expect(auditRows(world.db, 'patient.read_by_opening')).toEqual([])
  })

  it('computes the volume per kg from the measured volume, else the set one, else says that it is missing', () => {
    const world = makeWorld()
    expect(read(world).tidalVolumePerKg).toEqual({ reading: { known: false, reason: 'missing' }, from: null, observedAt: null })
    makeSettings(world.db, world.episode, world.place, { observedAt: NOW - 2 * HOUR_MS, setTidalVolumeMl: 450 })
    expect(read(world).tidalVolumePerKg).toMatchObject({
      from: 'set',
      reading: { value: expect.closeTo(450 / 75.116, 6) as number },
    })
    makeSettings(world.db, world.episode, world.place, {
      observedAt: NOW - HOUR_MS,
      setTidalVolumeMl: 450,
      measuredTidalVolumeMl: 430,
    })
    expect(read(world).tidalVolumePerKg).toMatchObject({
      from: 'measured',
      observedAt: NOW - HOUR_MS,
      reading: { value: expect.closeTo(430 / 75.116, 6) as number },
    })
  })

  it.each([
    ['2010-01-01', false, 'not_adult'],
    [null, null, 'age_unknown'],
  ])('computes no index for a birth date of %s and gives the reason', (birthDate, isAdult, reason) => {
    const world = makeWorld()
    world.db.update(patients).set({ birthDate }).run()
    makeSettings(world.db, world.episode, world.place, { measuredRatePerMin: 20, measuredTidalVolumeMl: 400 })
    addScreen(world, NOW - HOUR_MS)
    const page = read(world)
    expect(page.patient.isAdult).toBe(isAdult)
    expect(page.predictedBodyWeightKg).toEqual({ known: false, reason })
    expect(page.tidalVolumePerKg.reading).toEqual({ known: false, reason })
    expect(page.move).toMatchObject({ kind: 'none', reason: { code: reason } })
    expect(page.trends.rsbi).toEqual([])
    expect(page.trends.settings).toMatchObject([{ minuteVentilationLPerMin: null }])
  })

  it('says when the height lies outside the formula’s range', () => {
    const world = makeWorld()
    world.db.update(patients).set({ heightCm: 138 }).run()
    expect(read(world)).toMatchObject({ isHeightOutsideRange: true, patient: { unlikely: ['heightCm'] } })
  })

  it('groups entries by ventilator day, newest first, with both times and what is late or unlikely', () => {
    const world = makeWorld()
    addScreen(world, NOW - 26 * HOUR_MS, NOW - 20 * HOUR_MS)
    makeSettings(world.db, world.episode, world.place, { observedAt: NOW - HOUR_MS })
    makeGas(world.db, world.episode, world.place, { observedAt: NOW - 30 * MINUTE_MS })
    expect(read(world).days.map((day) => [day.day, day.dayNumber, day.entries.map((one) => one.kind)])).toEqual([
      [TODAY, 3, ['gas', 'settings']],
      ['2026-03-02', 2, ['screen']],
      ['2026-03-01', 1, ['airway']],
    ])
    const screen = read(world).days[1]?.entries[0]
    expect(screen?.entry).toMatchObject({
      isLate: true,
      observedAt: NOW - 26 * HOUR_MS,
      recordedAt: NOW - 20 * HOUR_MS,
      recordedByName: 'Robin Therapist',
      protocolNumber: 1,
    })
    expect(screen?.entry.unlikely).toEqual(['readings.spo2Percent'])
  })

  it('puts superseded versions under the entry and uses only the current one', () => {
    const world = makeWorld()
    const values = {
      mode: 'PC-CSV' as const,
      fio2Fraction: 0.4,
      setRatePerMin: null,
      setTidalVolumeMl: null,
      inspiratoryPressureCmH2O: null,
      pressureSupportCmH2O: 8,
      measuredRatePerMin: 18,
      measuredTidalVolumeMl: 430,
      peakPressureCmH2O: null,
      plateauPressureCmH2O: null,
      spo2Percent: 96,
    }
    const ctx = makeCtx(world.db, world.rt)
    const first = recordSettings(ctx, {
      episodeId: world.episode.id,
      observed: at(NOW - HOUR_MS),
      amends: null,
      peepCmH2O: 8,
      ...values,
    })
    recordSettings(ctx, {
      episodeId: world.episode.id,
      observed: at(NOW - HOUR_MS),
      amends: { id: first.id, reason: 'typed wrongly' },
      peepCmH2O: 5,
      ...values,
    })
    const [entry, ...others] = read(world)
      .days.flatMap((day) => day.entries)
      .filter((one) => one.kind === 'settings')
    expect(others).toEqual([])
    expect(entry).toMatchObject({
      entry: { peepCmH2O: 5, entryVersion: 2, isAmended: true, amendReason: 'typed wrongly' },
      earlier: [{ id: first.id, peepCmH2O: 8, entryVersion: 1 }],
    })
    expect(read(world).latest.settings).toMatchObject({ peepCmH2O: 5 })
    expect(read(world).trends.settings).toMatchObject([
      { peepCmH2O: 5, minuteVentilationLPerMin: expect.closeTo(7.74, 9) as number },
    ])
  })

  it('marks what the reader may correct: author or physician with the role for the step', () => {
    const world = makeWorld()
    makeSettings(world.db, world.episode, world.place)
    addScreen(world, NOW - HOUR_MS)
    const may = (person: World['rt']) =>
      Object.fromEntries(
        read(world, person)
          .days.flatMap((day) => day.entries)
          .map((one) => [one.kind, one.mayAmend]),
      )
    expect(may(world.rt)).toEqual({ settings: true, screen: true, airway: false })
    expect(may(world.nurse)).toEqual({ settings: false, screen: false, airway: false })
    expect(may(world.physician)).toEqual({ settings: true, screen: true, airway: false })
    expect(may(world.lead)).toEqual({ settings: false, screen: false, airway: false })
  })

  it('tells what the reader’s roles may do', () => {
    const world = makeWorld()
    expect(read(world, world.nurse).may).toMatchObject({
      'settings.record': true,
      'hold.start': true,
      'screen.record': false,
      'decision.sign': false,
    })
    expect(Object.values(read(world, world.lead).may).some(Boolean)).toBe(false)
  })

  it('draws RSBI, gases and P/F from screens, trials and gases', () => {
    const world = makeWorld()
    addScreen(world, NOW - 3 * HOUR_MS)
    const trial = world.db
      .insert(trials)
      .values({
        ...entryPlace(world.episode, world.place, NOW - HOUR_MS),
        technique: 't_piece',
        fio2Fraction: 0.4,
        plannedDurationMin: 30,
        baseline: OBSERVED,
      })
      .returning()
      .get()
    world.db
      .insert(trialObservations)
      .values({ ...entryPlace(world.episode, world.place, NOW - 50 * MINUTE_MS), trialId: trial.id, readings: OBSERVED })
      .run()
    makeGas(world.db, world.episode, world.place, { paO2MmHg: 90, fio2Fraction: 0.4, observedAt: NOW - 2 * HOUR_MS })
    const { trends } = read(world)
    expect(trends.rsbi).toEqual([
      { atMs: NOW - 3 * HOUR_MS, value: 50, from: 'screen' },
      { atMs: NOW - 50 * MINUTE_MS, value: 50, from: 'trial' },
    ])
    expect(trends.gases).toMatchObject([{ ph: 7.38, paO2MmHg: 90, pfRatio: 225 }])
  })

  it('reads the last episode, and an earlier one when asked', () => {
    const world = makeWorld()
    world.db
      .update(episodes)
      .set({ endedAt: NOW - 10 * HOUR_MS, end: 'extubated' })
      .run()
    const later = makeEpisode(
      world.db,
      { ...world.place, patientId: world.patient.id },
      { startedAt: NOW - 5 * HOUR_MS, start: 'reintubated' },
    )
    expect(read(world)).toMatchObject({
      episode: { id: later.id },
      earlierEpisodes: [{ id: world.episode.id, end: 'extubated' }],
      ventilatorDayNumber: 1,
    })
    expect(read(world, world.rt, { episodeId: world.episode.id })).toMatchObject({
      episode: { id: world.episode.id },
      ventilatorDayNumber: 2,
      move: { kind: 'none', reason: { code: 'episode_ended', end: 'extubated' } },
    })
    expectRefusal(() => read(world, world.rt, { episodeId: 'none' }), 'NOT_FOUND')
  })

  it('does not read another patient’s episode under this patient', () => {
    const world = makeWorld()
    const other = makePatient(world.db, world.hospital.id, world.rt.id)
    const foreign = makeEpisode(world.db, { ...world.place, patientId: other.id })
    expectRefusal(() => read(world, world.rt, { episodeId: foreign.id }), 'NOT_FOUND')
  })

  it('shows a patient who was never ventilated', () => {
    const world = makeWorld()
    const other = makePatient(world.db, world.hospital.id, world.rt.id)
    makeStay(world.db, { patientId: other.id, unitId: world.medical.unit.id, bedId: world.medical.beds[1]?.id ?? '' })
    const page = readPatient(makeCtx(world.db, world.rt), { patientId: other.id })
    expect(page).toMatchObject({
      episode: null,
      move: null,
      moveHref: null,
      days: [],
      ventilatorDayNumber: null,
      latest: { settings: null, gas: null },
    })
  })

  it('gives no number to a day after ventilation ended', () => {
    const world = makeWorld()
    world.db
      .update(episodes)
      .set({ endedAt: NOW - 20 * HOUR_MS, end: 'extubated' })
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
    expect(read(world).days[0]).toMatchObject({ day: TODAY, dayNumber: null })
  })

  it('refuses people of another unit and an administrator', () => {
    const world = makeWorld()
    expectDoor(world, readPatient, { patientId: world.patient.id }, null)
    expectDoor({ db: world.db, outsider: world.administrator }, readPatient, { patientId: world.patient.id }, null)
  })

  it('answers through its route', async () => {
    const world = makeWorld()
    serveDatabase(world.db)
    const ask = async (personId: string) => {
      const { cookie } = makeSession(world.db, personId)
      return GET(makeRequest('/api/x', { method: 'GET', cookie }), routeParams({ patientId: world.patient.id }))
    }
    const response = await ask(world.rt.id)
    expect(response.headers.get('cache-control')).toBe('no-store')
    expect(await response.json()).toMatchObject({ patient: { id: world.patient.id } })
    expect((await ask(world.outsider.id)).status).toBe(404)
  })
})
