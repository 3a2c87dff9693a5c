import { describe, expect, it } from 'vitest'
import { countExtubations, type ReviewAirwayEvent } from '@/lib/weaning/course/count-extubations'
import { countScreens, type ReviewScreen } from '@/lib/weaning/course/count-screens'
import { countTrials } from '@/lib/weaning/course/count-trials'
import type { VentilatedDay } from '@/lib/weaning/course/count-unit-days'
import { MEASURE_DEFINITIONS, REVIEW_MEASURES } from '@/lib/weaning/course/measure-definitions'
import { MEASURE_CHARTS, MEASURE_COLUMNS, monthStatus, share } from '@/lib/weaning/course/measure-table'
import { monthlyMeasures, type ReviewDay, type ReviewHistory } from '@/lib/weaning/course/monthly-measures'

const HOUR = 3_600_000
const DAY = 24 * HOUR
const START = Date.UTC(2026, 4, 30)
const dayOf = (ms: number) => new Date(ms).toISOString().slice(0, 10)
const makeDay = (index: number): ReviewDay => ({
  day: dayOf(START + index * DAY),
  startMs: START + index * DAY,
  endMs: START + (index + 1) * DAY,
  closesMs: START + index * DAY + 9 * HOUR,
})

describe('screens done of ventilator days eligible', () => {
  const day = makeDay(0)
  const episodes = [{ episodeId: 'e', patientId: 'p', startMs: day.startMs - DAY, endMs: null, birthDate: '1960-01-01' }]
  const ventilated = (over: Partial<VentilatedDay> = {}): VentilatedDay[] => [
    { patientId: 'p', day, firstStartMs: day.startMs - DAY, birthDate: '1960-01-01', nowMs: day.endMs, ...over },
  ]
  const screen = (result: ReviewScreen['result'], hour: number, ventilatorDay = day.day): ReviewScreen => ({
    episodeId: 'e',
    ventilatorDay,
    observedMs: day.startMs + hour * HOUR,
    result,
  })
  const counts = (days: VentilatedDay[], screens: ReviewScreen[]) => countScreens(days, screens, episodes).of('2026-05')

  it('counts a ready and a not ready screen as done, once a day', () => {
    expect(counts(ventilated(), [screen('not_ready', 6), screen('ready', 11)])).toMatchObject({
      eligible: 1,
      done: 1,
      incomplete: 0,
      excused: 0,
    })
  })
  it('counts a day without a screen as eligible and not done', () => {
    expect(counts(ventilated(), [])).toMatchObject({ eligible: 1, done: 0, incomplete: 0 })
  })
  it('counts a screen outside the window on the same ventilator day', () => {
    expect(counts(ventilated(), [screen('ready', 21)])).toMatchObject({ eligible: 1, done: 1 })
  })
  it('does not count a screen of another day', () => {
    expect(counts(ventilated(), [screen('ready', 30, makeDay(1).day)])).toMatchObject({ eligible: 1, done: 0 })
  })
  it('shows an incomplete screen apart, until a complete one follows', () => {
    expect(counts(ventilated(), [screen('incomplete', 6)])).toMatchObject({ eligible: 1, done: 0, incomplete: 1 })
    expect(counts(ventilated(), [screen('incomplete', 6), screen('not_ready', 7)])).toMatchObject({
      eligible: 1,
      done: 1,
      incomplete: 0,
    })
  })
  it('leaves out a day whose first entry excused the patient, whatever came later', () => {
    expect(counts(ventilated(), [screen('ready', 11), screen('excused', 6)])).toMatchObject({ eligible: 0, done: 0, excused: 1 })
  })
  it('keeps a day that was screened first and excused later', () => {
    expect(counts(ventilated(), [screen('not_ready', 6), screen('excused', 11)])).toMatchObject({
      eligible: 1,
      done: 1,
      excused: 0,
    })
  })
  it('leaves out a day on which ventilation began after the window closed, and keeps one that began as it closed', () => {
    expect(counts(ventilated({ firstStartMs: day.closesMs + 1 }), [screen('ready', 11)])).toMatchObject({
      eligible: 0,
      startedAfterWindow: 1,
    })
    expect(counts(ventilated({ firstStartMs: day.closesMs }), [])).toMatchObject({ eligible: 1, startedAfterWindow: 0 })
  })
  it('leaves out patients under 18 up to the day before their birthday, and those of unknown age', () => {
    expect(counts(ventilated({ birthDate: '2008-05-31' }), [])).toMatchObject({ eligible: 0, notAdult: 1 })
    expect(counts(ventilated({ birthDate: '2008-05-30' }), [])).toMatchObject({ eligible: 1, notAdult: 0 })
    expect(counts(ventilated({ birthDate: null }), [])).toMatchObject({ eligible: 0, notAdult: 1 })
  })
  it('does not yet count today while the window is open', () => {
    expect(counts(ventilated({ nowMs: day.closesMs }), [screen('ready', 6)])).toMatchObject({
      eligible: 0,
      done: 0,
      notYetDue: 1,
    })
    expect(counts(ventilated({ nowMs: day.closesMs + 1 }), [])).toMatchObject({ eligible: 1, notYetDue: 0 })
  })
})

describe('trials', () => {
  it('counts each outcome and the running one in the month in which the trial began', () => {
    const outcomes = ['passed', 'passed', 'failed', 'stopped', null] as const
    const found = countTrials([
      ...outcomes.map((outcome) => ({ ventilatorDay: '2026-05-31', outcome })),
      { ventilatorDay: '2026-06-01', outcome: 'failed' as const },
    ])
    expect(found.of('2026-05')).toEqual({ started: 5, passed: 2, failed: 1, stopped: 1, running: 1 })
    expect(found.of('2026-06')).toEqual({ started: 1, passed: 0, failed: 1, stopped: 0, running: 0 })
    expect(found.of('2026-07').started).toBe(0)
  })
})

describe('extubations and reintubations', () => {
  const event = (name: ReviewAirwayEvent['event'], hours: number, unitId = 'A', patientId = 'p'): ReviewAirwayEvent => ({
    patientId,
    unitId,
    ventilatorDay: dayOf(START + hours * HOUR),
    observedMs: START + hours * HOUR,
    event: name,
  })
  const LATER = START + 60 * DAY
  const planned = (events: ReviewAirwayEvent[], nowMs = LATER) => countExtubations(events, 'A', nowMs).of('2026-05')

  it.each([
    [48, 1, 1, 1],
    [48.0003, 0, 1, 1],
    [72, 0, 1, 1],
    [72.0003, 0, 0, 1],
    [168, 0, 0, 1],
    [168.0003, 0, 0, 0],
  ])('reintubated %s h after: within 48 h %s, 72 h %s, 7 days %s', (hours, in48, in72, in7d) => {
    const { afterPlanned } = planned([event('extubated', 10), event('reintubated', 10 + hours)])
    expect([afterPlanned.within48h.reintubated, afterPlanned.within72h.reintubated, afterPlanned.within7d.reintubated]).toEqual([
      in48,
      in72,
      in7d,
    ])
    expect(afterPlanned.within7d.known).toBe(1)
  })
  it('belongs to the month and unit of the extubation, wherever and whenever the tube went back', () => {
    const events = [event('extubated', 40, 'A'), event('reintubated', 60, 'B')]
    expect(countExtubations(events, 'A', LATER).of('2026-05')).toMatchObject({
      planned: 1,
      afterPlanned: { within48h: { reintubated: 1 } },
    })
    expect(countExtubations(events, 'B', LATER).of('2026-06').planned).toBe(0)
  })
  it('counts unplanned extubations apart', () => {
    const found = planned([event('self_extubated', 5), event('reintubated', 6), event('accidentally_extubated', 9, 'A', 'q')])
    expect(found).toMatchObject({ planned: 0, unplanned: 2, afterUnplanned: { within48h: { known: 2, reintubated: 1 } } })
  })
  it('leaves out what is too recent to know, even when reintubated already, and says so', () => {
    const events = [
      event('extubated', 0),
      event('reintubated', 5),
      event('extubated', 0, 'A', 'q'),
      event('extubated', 0, 'A', 'r'),
    ]
    const after50h = planned(events, START + 50 * HOUR).afterPlanned
    expect(after50h.within48h).toEqual({ known: 3, reintubated: 1, tooRecent: 0, tooRecentReintubated: 0 })
    expect(after50h.within7d).toEqual({ known: 0, reintubated: 0, tooRecent: 3, tooRecentReintubated: 1 })
    expect(share(after50h.within7d.reintubated, after50h.within7d.known)).toBeNull()
  })
  it('counts neither a tracheostomy nor a ventilator that is switched on again as reintubation', () => {
    const found = planned([event('extubated', 1), event('tracheostomy_placed', 20), event('ventilator_on', 30)])
    expect(found.afterPlanned.within48h.reintubated).toBe(0)
  })
})

describe('a unit’s months', () => {
  const history = (over: Partial<ReviewHistory> = {}): ReviewHistory => ({
    unitId: 'A',
    days: [0, 1, 2, 3].map(makeDay),
    nowMs: START + 3 * DAY + 8 * HOUR,
    stays: [],
    episodes: [],
    screens: [],
    trials: [],
    airwayEvents: [],
    ...over,
  })
  it('cuts a run of ventilation at the turn of the month', () => {
    const months = monthlyMeasures(
      history({
        stays: [{ patientId: 'p', unitId: 'A', startMs: START, endMs: null }],
        episodes: [{ episodeId: 'e', patientId: 'p', startMs: START + HOUR, endMs: null, birthDate: '1960-01-01' }],
      }),
    )
    expect(months.map(({ month, ventilatorDays, isUnfinished }) => [month, ventilatorDays, isUnfinished])).toEqual([
      ['2026-05', 2, false],
      ['2026-06', 2, true],
    ])
  })
  it('marks no month as unfinished when today lies after the months asked for', () => {
    expect(monthlyMeasures(history({ nowMs: START + 40 * DAY })).map(({ isUnfinished }) => isUnfinished)).toEqual([false, false])
  })
  it('answers empty months with zero counts and shares that are not computable', () => {
    const [first] = monthlyMeasures(history())
    if (!first) throw new Error('There is no month.')
    for (const measure of REVIEW_MEASURES) {
      for (const { kind, value } of MEASURE_COLUMNS[measure]) expect(value(first)).toBe(kind === 'count' ? 0 : null)
    }
  })
  it('does not change what it is given', () => {
    const given = history({ stays: [{ patientId: 'p', unitId: 'A', startMs: START, endMs: null }] })
    const before = JSON.stringify(given)
    monthlyMeasures(given)
    expect(JSON.stringify(given)).toBe(before)
  })
  it('marks a month with extubations too recent to know as provisional for reintubations only', () => {
    const extubated: ReviewAirwayEvent = {
      patientId: 'p',
      unitId: 'A',
      ventilatorDay: '2026-05-31',
      observedMs: START + 30 * HOUR,
      event: 'extubated',
    }
    const [may] = monthlyMeasures(history({ airwayEvents: [extubated] }))
    if (!may) throw new Error('There is no month.')
    expect([monthStatus('reintubations', may), monthStatus('extubations', may)]).toEqual(['provisional', ''])
  })
})

describe('the table of measures', () => {
  it('says for every measure what is counted, and for every share of what', () => {
    for (const measure of REVIEW_MEASURES) {
      const hasShare = MEASURE_COLUMNS[measure].some(({ kind }) => kind !== 'count')
      expect(MEASURE_DEFINITIONS[measure].numerator.length).toBeGreaterThan(10)
      expect(MEASURE_DEFINITIONS[measure].denominator !== null).toBe(hasShare)
    }
  })
  it('draws only columns that the table has', () => {
    for (const measure of REVIEW_MEASURES) {
      const keys = MEASURE_COLUMNS[measure].map(({ key }) => key)
      expect(new Set(keys).size).toBe(keys.length)
      expect(MEASURE_CHARTS[measure].columns.every((key) => keys.includes(key))).toBe(true)
    }
  })
  it('never makes 0 of what cannot be computed', () => {
    expect(share(0, 0)).toBeNull()
    expect(share(0, 5)).toBe(0)
  })
})
