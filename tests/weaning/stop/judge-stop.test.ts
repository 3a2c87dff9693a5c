import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { StopRule } from '@/lib/weaning/protocol'
import { defaultProtocol } from '@/lib/weaning/published/default-protocol'
import { stopBoles2007 } from '@/lib/weaning/published/stop-boles-2007'
import { stopGirard2008 } from '@/lib/weaning/published/stop-girard-2008'
import type { StopList } from '@/lib/weaning/published/stop-list'
import type { ObservedReadings } from '@/lib/weaning/readings'
import { judgeStop } from '@/lib/weaning/stop/judge-stop'
import type { Observation } from '@/lib/weaning/stop/observation'
import { rulesMet } from '@/lib/weaning/stop/rules-met'
import { BEDSIDE_SIGNS } from '@/lib/weaning/vocabulary'
import { at, look } from '../fixtures'

const HOUR = 3_600_000
const idsMet = (rules: readonly StopRule[], baseline: ObservedReadings | null, looks: Observation[], nowMs = 24 * HOUR) =>
  rulesMet(judgeStop(rules, baseline, looks, nowMs)).ids
const metBy = ({ rules }: StopList, baseline: Partial<ObservedReadings>, looks: Observation[]) =>
  idsMet(
    rules.map(({ rule }) => rule),
    look(baseline),
    looks,
  )

type Case = {
  id: string
  baseline: Partial<ObservedReadings>
  looks: Observation[]
  boles: string[]
  girard: string[]
}
const CASES: Case[] = [
  {
    id: 'R-S1',
    baseline: { breathsPerMin: 20, heartRatePerMin: 88, systolicMmHg: 130, spo2Percent: 96 },
    looks: [at(30, { breathsPerMin: 28, heartRatePerMin: 104, systolicMmHg: 150, spo2Percent: 94 })],
    boles: [],
    girard: [],
  },
  { id: 'R-S2', baseline: { breathsPerMin: 18 }, looks: [at(5, { breathsPerMin: 27 })], boles: ['breaths_rise'], girard: [] },
  {
    id: 'R-S3',
    baseline: { heartRatePerMin: 95 },
    looks: [at(5, { heartRatePerMin: 114 })],
    boles: ['heart_rate_rise'],
    girard: [],
  },
  {
    id: 'R-S4',
    baseline: { breathsPerMin: 20 },
    looks: [at(5, { breathsPerMin: 37 }), at(9, { breathsPerMin: 37 }), at(10, { breathsPerMin: 30 })],
    boles: ['breaths_high', 'breaths_rise'],
    girard: [],
  },
  {
    id: 'R-S5',
    baseline: { breathsPerMin: 26 },
    looks: [at(10, { breathsPerMin: 36 }), at(16, { breathsPerMin: 36 })],
    boles: ['breaths_high'],
    girard: ['breaths_high'],
  },
  {
    id: 'R-S6',
    baseline: { spo2Percent: 95 },
    looks: [at(5, { spo2Percent: 89 }), at(15, { spo2Percent: 89 })],
    boles: ['spo2_low'],
    girard: [],
  },
  {
    id: 'R-S7',
    baseline: { spo2Percent: 95 },
    looks: [at(5, { spo2Percent: 87 }), at(10, { spo2Percent: 87 })],
    boles: ['spo2_low'],
    girard: ['spo2_low'],
  },
  {
    id: 'R-S8',
    baseline: { heartRatePerMin: 118 },
    looks: [at(5, { heartRatePerMin: 132, signs: ['sweating'] })],
    boles: ['sweating'],
    girard: ['distress_signs'],
  },
  { id: 'R-S9', baseline: { heartRatePerMin: 118 }, looks: [at(5, { heartRatePerMin: 132 })], boles: [], girard: [] },
  { id: 'R-S10', baseline: { systolicMmHg: 150 }, looks: [at(5, { systolicMmHg: 180 })], boles: ['systolic_rise'], girard: [] },
  {
    id: 'R-S11',
    baseline: { paCO2MmHg: 44 },
    looks: [at(30, { paCO2MmHg: 53 })],
    boles: ['paco2_high', 'paco2_rise'],
    girard: [],
  },
  { id: 'R-S12', baseline: { paCO2MmHg: 40 }, looks: [at(30, { paCO2MmHg: 48 })], boles: [], girard: [] },
  { id: 'R-S13', baseline: { ph: 7.42 }, looks: [at(30, { ph: 7.35 })], boles: ['ph_fall'], girard: [] },
  {
    id: 'R-S14',
    baseline: { paCO2MmHg: 58, ph: 7.36 },
    looks: [at(30, { paCO2MmHg: 63, ph: 7.34 })],
    boles: ['paco2_high'],
    girard: [],
  },
  {
    id: 'R-S15',
    baseline: { breathsPerMin: 12 },
    looks: [at(5, { breathsPerMin: 7 }), at(10, { breathsPerMin: 7 })],
    boles: [],
    girard: ['breaths_low'],
  },
  {
    id: 'R-S16',
    baseline: {},
    looks: [at(5, { signs: ['new_arrhythmia'] })],
    boles: ['new_arrhythmia'],
    girard: ['new_arrhythmia'],
  },
]

describe('judgeStop on the worked trials', () => {
  it.each(CASES)(
    'judges $id by the list of Boles 2007, doi:10.1183/09031936.00010206 (sweating from memory)',
    ({ baseline, looks, boles }) => {
      expect(metBy(stopBoles2007, baseline, looks)).toEqual(boles)
    },
  )
  it.each(CASES)(
    'judges $id by the list of Girard 2008, doi:10.1016/S0140-6736(08)60105-1 (from memory)',
    ({ baseline, looks, girard }) => {
      expect(metBy(stopGirard2008, baseline, looks)).toEqual(girard)
    },
  )
})

describe('the single limits of Boles 2007', () => {
  it.each([
    ['spo2_low', { spo2Percent: 89 }, { spo2Percent: 90 }],
    ['paco2_high', { paCO2MmHg: 50.1 }, { paCO2MmHg: 50 }],
    ['ph_low', { ph: 7.31 }, { ph: 7.32 }],
    ['rsbi_high', { breathsPerMin: 32, tidalVolumeMl: 304 }, { breathsPerMin: 21, tidalVolumeMl: 200 }],
    ['breaths_high', { breathsPerMin: 36 }, { breathsPerMin: 35 }],
    ['heart_rate_high', { heartRatePerMin: 141 }, { heartRatePerMin: 140 }],
    ['systolic_high', { systolicMmHg: 181 }, { systolicMmHg: 180 }],
    ['systolic_low', { systolicMmHg: 89 }, { systolicMmHg: 90 }],
  ] as const)('meet %s by %o and not by %o', (id, beyond, onLimit) => {
    expect(metBy(stopBoles2007, {}, [at(1, beyond)])).toContain(id)
    expect(metBy(stopBoles2007, {}, [at(1, onLimit)])).not.toContain(id)
  })
})

const breathsHigh: StopRule = {
  kind: 'limit',
  id: 'breaths_high',
  reading: 'breathsPerMin',
  limit: { comparator: 'above', value: 35 },
  sustainedMin: 5,
  source: 'test',
}
const judgeBreaths = (looks: Observation[], nowMs = 24 * HOUR) => judgeStop([breathsHigh], null, looks, nowMs)[0]

describe('a sustained limit', () => {
  it('is unknown without a look, and without a look that has the value', () => {
    expect(judgeBreaths([])).toMatchObject({ state: 'unknown', lastLookMs: null })
    expect(judgeBreaths([at(2, { spo2Percent: 95 })])).toMatchObject({ state: 'unknown', lastValue: null })
  })

  it('is near after the first look beyond it, and says when it would be reached', () => {
    expect(judgeBreaths([at(10, { breathsPerMin: 38 })])).toMatchObject({
      state: 'near',
      sinceMs: 10 * 60_000,
      reachedAtMs: 15 * 60_000,
      metAtMs: null,
      isBeyondNow: true,
      lastValue: 38,
    })
  })

  it('stays near however late it is, until somebody looks again', () => {
    expect(judgeBreaths([at(10, { breathsPerMin: 38 })], 23 * HOUR)?.state).toBe('near')
  })

  it.each([
    [14, 'near'],
    [15, 'met'],
    [16, 'met'],
  ])('with the second look beyond it at minute %s is %s', (minute, state) => {
    expect(judgeBreaths([at(10, { breathsPerMin: 38 }), at(minute, { breathsPerMin: 36 })])?.state).toBe(state)
  })

  it('is met at the look that made it long enough', () => {
    const looks = [10, 13, 17, 20].map((minute) => at(minute, { breathsPerMin: 38 }))
    expect(judgeBreaths(looks)).toMatchObject({ state: 'met', sinceMs: 10 * 60_000, metAtMs: 17 * 60_000, reachedAtMs: null })
  })

  it('begins anew after a look back inside', () => {
    const looks = [at(10, { breathsPerMin: 38 }), at(13, { breathsPerMin: 35 }), at(16, { breathsPerMin: 38 })]
    expect(judgeBreaths(looks)).toMatchObject({ state: 'near', sinceMs: 16 * 60_000 })
  })

  it('is neither broken nor lengthened by a look without the value', () => {
    const gap = [at(10, { breathsPerMin: 38 }), at(13, { heartRatePerMin: 90 })]
    expect(judgeBreaths([...gap, at(16, { spo2Percent: 90 })])).toMatchObject({ state: 'near', sinceMs: 10 * 60_000 })
    expect(judgeBreaths([...gap, at(16, { breathsPerMin: 38 })])?.state).toBe('met')
  })

  it('once met stays met after a calm look, and says that it is back inside', () => {
    const looks = [at(10, { breathsPerMin: 38 }), at(15, { breathsPerMin: 38 }), at(20, { breathsPerMin: 24 })]
    expect(judgeBreaths(looks)).toMatchObject({ state: 'met', metAtMs: 15 * 60_000, isBeyondNow: false, lastValue: 24 })
  })

  it('is judged in order of time, whatever the order of entry', () => {
    const looks = [at(16, { breathsPerMin: 38 }), at(10, { breathsPerMin: 38 })]
    expect(judgeBreaths(looks)?.state).toBe('met')
    expect(looks[0]?.atMs).toBe(16 * 60_000)
  })

  it('does not count a look later than the moment asked about', () => {
    const looks = [at(10, { breathsPerMin: 38 }), at(16, { breathsPerMin: 38 })]
    expect(judgeBreaths(looks, 12 * 60_000)?.state).toBe('near')
    expect(judgeBreaths(looks, 16 * 60_000)?.state).toBe('met')
  })

  it('does not count an impossible value', () => {
    expect(judgeBreaths([at(10, { breathsPerMin: 380 })])?.state).toBe('unknown')
  })
})

describe('a change from baseline', () => {
  const rise = defaultProtocol.trial.stopRules.filter(({ id }) => id === 'heart_rate_rise')
  const judge = (baseline: ObservedReadings | null, looks: Observation[]) => judgeStop(rise, baseline, looks, 24 * HOUR)[0]

  it('is unknown without a baseline, or when the baseline lacks the reading', () => {
    const looks = [at(2, { heartRatePerMin: 150 }), at(9, { heartRatePerMin: 150 })]
    expect(judge(null, looks)?.state).toBe('unknown')
    expect(judge(look({ breathsPerMin: 20 }), looks)?.state).toBe('unknown')
  })

  it.each([
    [113, 'clear'],
    [114, 'met'],
    [115, 'met'],
  ])('of 95 to %s for 5 min is %s', (heartRatePerMin, state) => {
    expect(judge(look({ heartRatePerMin: 95 }), [at(5, { heartRatePerMin }), at(10, { heartRatePerMin })])?.state).toBe(state)
  })
})

describe('signs', () => {
  const distress = stopGirard2008.rules.map(({ rule }) => rule).filter(({ kind }) => kind === 'signs')
  const judge = (looks: Observation[]) => judgeStop(distress, null, looks, 24 * HOUR)[0]

  it('are counted at one look, never added up over several', () => {
    expect(judge([at(2, { signs: ['sweating'] }), at(5, { signs: ['accessory_muscles'] })])).toMatchObject({
      state: 'near',
      lastValue: 1,
    })
    expect(judge([at(2, { signs: ['sweating', 'accessory_muscles'] })])).toMatchObject({ state: 'met', lastValue: 2 })
  })

  it('count the same sign once', () => {
    expect(judge([at(2, { signs: ['sweating', 'sweating'] })])?.state).toBe('near')
  })

  it.each([
    [130, 1],
    [131, 2],
    [60, 1],
    [59, 2],
  ])('count a heart rate of %s beside sweating as %s signs', (heartRatePerMin, count) => {
    expect(judge([at(2, { heartRatePerMin, signs: ['sweating'] })])?.lastValue).toBe(count)
  })

  it('are clear when none is present, and when one has gone', () => {
    expect(judge([at(2, {})])?.state).toBe('clear')
    expect(judge([at(2, { signs: ['sweating'] }), at(5, {})])?.state).toBe('clear')
  })

  it('that must last are near at the first look and met at one 5 min later', () => {
    const agitation = defaultProtocol.hold.failRules.filter(({ id }) => id === 'agitation')
    expect(judgeStop(agitation, null, [at(10, { signs: ['agitation'] })], 24 * HOUR)[0]).toMatchObject({
      state: 'near',
      reachedAtMs: 15 * 60_000,
    })
    expect(idsMet(agitation, null, [at(10, { signs: ['agitation'] }), at(15, { signs: ['agitation'] })])).toEqual(['agitation'])
    expect(idsMet(agitation, null, [at(10, { signs: ['agitation'] }), at(12, {}), at(15, { signs: ['agitation'] })])).toEqual([])
  })
})

describe('rulesMet', () => {
  it('gives the moment of the first rule met', () => {
    const looks = [at(5, { systolicMmHg: 85, breathsPerMin: 40 }), at(10, { breathsPerMin: 40 })]
    expect(rulesMet(judgeStop(defaultProtocol.trial.stopRules, look({}), looks, 24 * HOUR))).toEqual({
      ids: ['breaths_high', 'systolic_low'],
      firstMetMs: 5 * 60_000,
    })
  })
  it('gives nothing of a calm trial', () => {
    expect(rulesMet(judgeStop(defaultProtocol.trial.stopRules, look({}), [], 0))).toEqual({ ids: [], firstMetMs: null })
  })
})

const maybe = <T>(value: fc.Arbitrary<T>) => fc.option(value, { nil: null })
const anyLook: fc.Arbitrary<ObservedReadings> = fc.record({
  breathsPerMin: maybe(fc.integer({ min: 1, max: 80 })),
  tidalVolumeMl: maybe(fc.integer({ min: 50, max: 1000 })),
  spo2Percent: maybe(fc.integer({ min: 60, max: 100 })),
  heartRatePerMin: maybe(fc.integer({ min: 30, max: 200 })),
  systolicMmHg: maybe(fc.integer({ min: 50, max: 250 })),
  diastolicMmHg: fc.constant(null),
  rass: maybe(fc.integer({ min: -5, max: 4 })),
  paCO2MmHg: maybe(fc.integer({ min: 15, max: 100 })),
  paO2MmHg: maybe(fc.integer({ min: 30, max: 300 })),
  ph: maybe(fc.integer({ min: 680, max: 770 }).map((value) => value / 100)),
  signs: fc.subarray([...BEDSIDE_SIGNS]),
})
const anyLooks = fc.array(
  fc.record({ atMs: fc.integer({ min: 0, max: 120 }).map((minute) => minute * 60_000), readings: anyLook }),
  { maxLength: 12 },
)
/** Inside every limit of the default protocol, for any baseline. */
const calm: ObservedReadings = look({
  breathsPerMin: 18,
  spo2Percent: 96,
  heartRatePerMin: 75,
  systolicMmHg: 120,
  tidalVolumeMl: 450,
  ph: 7.4,
  paCO2MmHg: 40,
})
const calmBaseline = look({ breathsPerMin: 18, heartRatePerMin: 75, systolicMmHg: 120 })
const rules = defaultProtocol.trial.stopRules

describe('judgeStop on arbitrary looks', () => {
  it('is never met by adding a look inside the limits, and a rule met is never hidden by one', () => {
    fc.assert(
      fc.property(anyLooks, fc.integer({ min: 0, max: 130 }), (looks, minute) => {
        const before = idsMet(rules, calmBaseline, looks)
        const after = idsMet(rules, calmBaseline, [...looks, { atMs: minute * 60_000, readings: calm }])
        expect(after.filter((id) => !before.includes(id))).toEqual([])
        const later = idsMet(rules, calmBaseline, [...looks, { atMs: 200 * 60_000, readings: calm }])
        expect(later).toEqual(before)
      }),
      { numRuns: 400 },
    )
  })

  it('is never met by adding a look that observed nothing', () => {
    fc.assert(
      fc.property(anyLooks, fc.integer({ min: 0, max: 130 }), (looks, minute) => {
        const limits = rules.filter(({ kind }) => kind === 'limit' || kind === 'change')
        expect(idsMet(limits, calmBaseline, [...looks, at(minute, {})])).toEqual(idsMet(limits, calmBaseline, looks))
      }),
    )
  })

  it('gives one verdict for each rule, in order, with times only where the state has them and no value that is no number', () => {
    fc.assert(
      fc.property(anyLooks, maybe(anyLook), (looks, baseline) => {
        const verdicts = judgeStop(rules, baseline, looks, 24 * HOUR)
        expect(verdicts.map(({ ruleId }) => ruleId)).toEqual(rules.map(({ id }) => id))
        for (const verdict of verdicts) {
          expect(verdict.metAtMs !== null).toBe(verdict.state === 'met')
          expect(verdict.lastLookMs === null).toBe(verdict.state === 'unknown')
          if (verdict.reachedAtMs !== null) expect(verdict.state).toBe('near')
          if (verdict.lastValue !== null) expect(Number.isFinite(verdict.lastValue)).toBe(true)
        }
      }),
      { numRuns: 300 },
    )
  })

  it('leaves frozen looks as they are', () => {
    const looks = Object.freeze(
      [at(10, { breathsPerMin: 38 }), at(5, { breathsPerMin: 38 })].map((entry) => Object.freeze(entry)),
    )
    expect(idsMet(rules, Object.freeze({ ...calmBaseline }), [...looks])).toContain('breaths_high')
    expect(judgeStop(rules, calmBaseline, looks, 24 * HOUR)).toHaveLength(rules.length)
  })
})
