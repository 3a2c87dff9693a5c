import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { ScreenRule } from '@/lib/weaning/protocol'
import { defaultProtocol } from '@/lib/weaning/published/default-protocol'
import { criterionValue } from '@/lib/weaning/screen/criterion-value'
import { describeLimit } from '@/lib/weaning/screen/describe-limit'
import { judgeScreen } from '@/lib/weaning/screen/judge-screen'
import type { ScreenReadings } from '@/lib/weaning/readings'
import { COUGHS, SCREEN_CRITERIA, SECRETIONS, type ScreenCriterion } from '@/lib/weaning/vocabulary'
import { goodScreen, nothingScreened } from '../fixtures'

const source = 'test'
const number = (
  criterion: Extract<ScreenRule, { kind: 'number' }>['criterion'],
  ...limits: Extract<ScreenRule, { kind: 'number' }>['limits']
): ScreenRule => ({
  kind: 'number',
  criterion,
  limits,
  source,
})
/** One rule for every criterion. */
const everyRule: ScreenRule[] = [
  ...defaultProtocol.screen,
  number('spo2', { comparator: 'atLeast', value: 88 }),
  number('pfRatio', { comparator: 'atLeast', value: 150 }),
  number('ph', { comparator: 'atLeast', value: 7.25 }),
  number('rass', { comparator: 'atLeast', value: -2 }, { comparator: 'atMost', value: 1 }),
  number('temperature', { comparator: 'atLeast', value: 36 }, { comparator: 'atMost', value: 38.5 }),
  number('haemoglobin', { comparator: 'atLeast', value: 7 }),
  number('rsbi', { comparator: 'atMost', value: 105 }),
  { kind: 'yesNo', criterion: 'spontaneousEffort', expect: true, source },
  { kind: 'yesNo', criterion: 'raisedIcp', expect: false, source },
  { kind: 'yesNo', criterion: 'neuromuscularBlockade', expect: false, source },
  { kind: 'yesNo', criterion: 'causeImproving', expect: true, source },
  { kind: 'word', criterion: 'cough', accept: ['strong'], source },
  { kind: 'word', criterion: 'secretions', accept: ['scant', 'moderate'], source },
]
const judge = (readings: Partial<ScreenReadings>, rules = everyRule) => judgeScreen(rules, { ...goodScreen, ...readings }, true)
const markOf = (criterion: ScreenCriterion, readings: Partial<ScreenReadings>) =>
  judge(readings).criteria.find((verdict) => verdict.criterion === criterion)

describe('judgeScreen', () => {
  it('covers every criterion of the word list in this test', () => {
    expect(new Set(everyRule.map(({ criterion }) => criterion))).toEqual(new Set(SCREEN_CRITERIA))
  })

  it('is ready when every criterion is met, R-Q1', () => {
    expect(judge({}).result).toBe('ready')
    expect(judgeScreen(defaultProtocol.screen, goodScreen, true).result).toBe('ready')
  })

  it('is incomplete when any one criterion is not assessed and all others are met', () => {
    const left: [keyof ScreenReadings, ScreenCriterion][] = [
      ['fio2Fraction', 'fio2'],
      ['peepCmH2O', 'peep'],
      ['norepinephrineMcgPerKgMin', 'norepinephrine'],
      ['otherVasopressor', 'otherVasopressor'],
      ['ischaemia', 'ischaemia'],
      ['spo2Percent', 'spo2'],
      ['paO2MmHg', 'pfRatio'],
      ['paO2FiO2Fraction', 'pfRatio'],
      ['ph', 'ph'],
      ['spontaneousEffort', 'spontaneousEffort'],
      ['cough', 'cough'],
      ['secretions', 'secretions'],
      ['rass', 'rass'],
      ['raisedIcp', 'raisedIcp'],
      ['neuromuscularBlockade', 'neuromuscularBlockade'],
      ['temperatureC', 'temperature'],
      ['haemoglobinGPerDl', 'haemoglobin'],
      ['causeImproving', 'causeImproving'],
      ['breathsPerMin', 'rsbi'],
      ['tidalVolumeMl', 'rsbi'],
    ]
    for (const [reading, criterion] of left) {
      const verdict = judge({ [reading]: null })
      expect(verdict.result).toBe('incomplete')
      expect(verdict.criteria.filter(({ mark }) => mark !== 'met')).toEqual([
        { criterion, mark: 'not_assessed', value: null, unknownBecause: 'missing' },
      ])
    }
  })

  it('is not ready when one criterion is not met, even when another is not assessed', () => {
    expect(judge({ peepCmH2O: 9, cough: null }).result).toBe('not_ready')
  })

  it.each([
    ['fio2', { fio2Fraction: 0.49 }, 'met'],
    ['fio2', { fio2Fraction: 0.5 }, 'met'],
    ['fio2', { fio2Fraction: 0.51 }, 'not_met'],
    ['peep', { peepCmH2O: 7.9 }, 'met'],
    ['peep', { peepCmH2O: 8 }, 'met'],
    ['peep', { peepCmH2O: 8.1 }, 'not_met'],
    ['norepinephrine', { norepinephrineMcgPerKgMin: 0.09 }, 'met'],
    ['norepinephrine', { norepinephrineMcgPerKgMin: 0.1 }, 'met'],
    ['norepinephrine', { norepinephrineMcgPerKgMin: 0.104 }, 'not_met'],
    ['otherVasopressor', { otherVasopressor: true }, 'not_met'],
    ['ischaemia', { ischaemia: true }, 'not_met'],
    ['spo2', { spo2Percent: 87 }, 'not_met'],
    ['spo2', { spo2Percent: 88 }, 'met'],
    ['pfRatio', { paO2MmHg: 60, paO2FiO2Fraction: 0.4 }, 'met'],
    ['pfRatio', { paO2MmHg: 59.9, paO2FiO2Fraction: 0.4 }, 'not_met'],
    ['ph', { ph: 7.24 }, 'not_met'],
    ['ph', { ph: 7.25 }, 'met'],
    ['rass', { rass: -3 }, 'not_met'],
    ['rass', { rass: -2 }, 'met'],
    ['rass', { rass: 1 }, 'met'],
    ['rass', { rass: 2 }, 'not_met'],
    ['temperature', { temperatureC: 38.5 }, 'met'],
    ['temperature', { temperatureC: 38.6 }, 'not_met'],
    ['temperature', { temperatureC: 35.9 }, 'not_met'],
    ['haemoglobin', { haemoglobinGPerDl: 6.9 }, 'not_met'],
    ['haemoglobin', { haemoglobinGPerDl: 7 }, 'met'],
    ['rsbi', { breathsPerMin: 21, tidalVolumeMl: 200 }, 'met'],
    ['rsbi', { breathsPerMin: 32, tidalVolumeMl: 304 }, 'not_met'],
    ['cough', { cough: 'weak' }, 'not_met'],
    ['secretions', { secretions: 'moderate' }, 'met'],
    ['secretions', { secretions: 'copious' }, 'not_met'],
    ['spontaneousEffort', { spontaneousEffort: false }, 'not_met'],
    ['raisedIcp', { raisedIcp: true }, 'not_met'],
    ['neuromuscularBlockade', { neuromuscularBlockade: true }, 'not_met'],
    ['causeImproving', { causeImproving: false }, 'not_met'],
  ] as const)('marks %s of %o as %s', (criterion, readings, mark) => {
    expect(markOf(criterion, readings)).toMatchObject({ mark, unknownBecause: null })
  })

  it.each([
    ['fio2', { fio2Fraction: 40 }],
    ['pfRatio', { paO2FiO2Fraction: 40 }],
    ['rsbi', { tidalVolumeMl: 0 }],
    ['rsbi', { tidalVolumeMl: 0.4 }],
    ['rass', { rass: -1.5 }],
    ['ph', { ph: Number.NaN }],
  ] as const)('does not assess %s with the impossible %o', (criterion, readings) => {
    expect(markOf(criterion, readings)).toEqual({ criterion, mark: 'not_assessed', value: null, unknownBecause: 'implausible' })
  })

  it('keeps the value compared, unrounded', () => {
    expect(markOf('rsbi', { breathsPerMin: 32, tidalVolumeMl: 305 })?.value).toBe(32_000 / 305)
  })

  it('computes nothing under 18 years or with unknown age, and is never ready then', () => {
    for (const [isAdult, reason] of [
      [false, 'not_adult'],
      [null, 'age_unknown'],
    ] as const) {
      const verdict = judgeScreen(everyRule, goodScreen, isAdult)
      expect(verdict.result).toBe('incomplete')
      expect(new Set(verdict.criteria.map(({ unknownBecause }) => unknownBecause))).toEqual(new Set([reason]))
    }
  })

  it('is never ready by a protocol without criteria, or by a criterion without a limit', () => {
    expect(judgeScreen([], goodScreen, true).result).toBe('incomplete')
    expect(judgeScreen([number('fio2')], goodScreen, true).result).toBe('not_ready')
    expect(judgeScreen([{ kind: 'word', criterion: 'cough', accept: [], source }], goodScreen, true).result).toBe('not_ready')
  })

  it('leaves frozen rules and readings as they are and names its rule set', () => {
    const verdict = judgeScreen(Object.freeze([...everyRule]), Object.freeze({ ...goodScreen }), true)
    expect(verdict).toMatchObject({ result: 'ready', ruleSet: 'screen-1' })
  })
})

const maybe = <T>(value: fc.Arbitrary<T>) => fc.option(value, { nil: null })
const anyNumber = maybe(fc.oneof(fc.double(), fc.double({ min: 0, max: 2 }), fc.integer({ min: -5, max: 200 })))
const anyScreen: fc.Arbitrary<ScreenReadings> = fc.record({
  fio2Fraction: anyNumber,
  peepCmH2O: anyNumber,
  norepinephrineMcgPerKgMin: anyNumber,
  otherVasopressor: maybe(fc.boolean()),
  ischaemia: maybe(fc.boolean()),
  spo2Percent: anyNumber,
  paO2MmHg: anyNumber,
  paO2FiO2Fraction: anyNumber,
  ph: anyNumber,
  spontaneousEffort: maybe(fc.boolean()),
  cough: maybe(fc.constantFrom(...COUGHS)),
  secretions: maybe(fc.constantFrom(...SECRETIONS)),
  rass: anyNumber,
  raisedIcp: maybe(fc.boolean()),
  neuromuscularBlockade: maybe(fc.boolean()),
  temperatureC: anyNumber,
  haemoglobinGPerDl: anyNumber,
  causeImproving: maybe(fc.boolean()),
  breathsPerMin: anyNumber,
  tidalVolumeMl: anyNumber,
  rsbiCondition: fc.constant(null),
})

describe('judgeScreen on arbitrary readings', () => {
  it('is ready only when every criterion was assessed and met, and never holds a value that is no number', () => {
    fc.assert(
      fc.property(anyScreen, fc.subarray(everyRule), (readings, rules) => {
        const { result, criteria } = judgeScreen(rules, readings, true)
        const marks = criteria.map(({ mark }) => mark)
        expect(result === 'ready').toBe(marks.length > 0 && marks.every((mark) => mark === 'met'))
        expect(result === 'not_ready').toBe(marks.includes('not_met'))
        for (const { value, mark, unknownBecause } of criteria) {
          expect(value === null).toBe(mark === 'not_assessed')
          expect(unknownBecause === null).toBe(mark !== 'not_assessed')
          if (typeof value === 'number') expect(Number.isFinite(value)).toBe(true)
        }
      }),
      { numRuns: 500 },
    )
  })

  it('never becomes ready by taking a reading away', () => {
    fc.assert(
      fc.property(anyScreen, fc.constantFrom(...(Object.keys(nothingScreened) as (keyof ScreenReadings)[])), (readings, name) => {
        const before = judgeScreen(everyRule, readings, true).result
        const after = judgeScreen(everyRule, { ...readings, [name]: null }, true).result
        expect(after === 'ready' && before !== 'ready').toBe(false)
      }),
      { numRuns: 300 },
    )
  })

  it('never becomes ready with nothing assessed, whatever the criteria', () => {
    for (const rule of everyRule) expect(judgeScreen([rule], nothingScreened, true).result).toBe('incomplete')
  })
})

describe('describeLimit', () => {
  it('says what each kind of criterion asks for', () => {
    expect(describeLimit(number('rass', { comparator: 'atLeast', value: -2 }, { comparator: 'atMost', value: 1 }))).toBe(
      '\u22122 to +1',
    )
    expect(describeLimit(number('rsbi', { comparator: 'below', value: 105 }))).toBe('below 105')
    expect(describeLimit(number('peep', { comparator: 'atMost', value: 7.5 }))).toBe('7.5 or less')
    expect(describeLimit(number('ph', { comparator: 'above', value: 7.25 }, { comparator: 'below', value: 7.5 }))).toBe(
      'above 7.25 and below 7.50',
    )
    expect(describeLimit({ kind: 'yesNo', criterion: 'spontaneousEffort', expect: true, source })).toBe('present')
    expect(describeLimit({ kind: 'word', criterion: 'secretions', accept: ['scant', 'moderate'], source })).toBe(
      'scant or moderate',
    )
  })
})

describe('criterionValue', () => {
  it('computes P/F from the FiO2 at the time of the gas, not the present one', () => {
    expect(criterionValue('pfRatio', { ...goodScreen, fio2Fraction: 0.3, paO2FiO2Fraction: 0.4, paO2MmHg: 80 })).toEqual({
      known: true,
      value: 200,
    })
  })
})
