import { describe, expect, it } from 'vitest'
import { changeFromBaseline } from '@/lib/weaning/compare/change-from-baseline'
import { meetsLimit } from '@/lib/weaning/compare/meets-limit'
import { breathingIndex } from '@/lib/weaning/indices/breathing-index'

const over105 = { comparator: 'above', value: 105 } as const
const indexOf = (breathsPerMin: number, tidalVolumeMl: number) => {
  const answer = breathingIndex({ breathsPerMin, tidalVolumeMl, isAdult: true })
  return answer.known ? answer.value : null
}

describe('breathingIndex', () => {
  // Formula and threshold: Yang & Tobin 1991, doi:10.1056/NEJM199105233242101.
  it.each([
    ['R-RSBI-1, published example', 24, 350, 68.6, false],
    ['R-RSBI-2, published inputs', 25, 400, 62.5, false],
    ['R-RSBI-3, derived', 30, 300, 100.0, false],
    ['R-RSBI-4, derived', 18, 500, 36.0, false],
    ['R-RSBI-5, derived', 35, 250, 140.0, true],
    ['R-RSBI-6, derived, exactly 105', 21, 200, 105.0, false],
    ['R-RSBI-7, derived, just under 105', 32, 305, 104.9, false],
    ['R-RSBI-8, derived, just over 105', 32, 304, 105.3, true],
    ['R-RSBI-9, derived', 40, 275, 145.5, true],
  ])('gives the value of %s', (_source, breathsPerMin, tidalVolumeMl, expected, isOver) => {
    const value = indexOf(breathsPerMin, tidalVolumeMl)
    expect(value?.toFixed(1)).toBe(expected.toFixed(1))
    expect(value !== null && meetsLimit(value, over105)).toBe(isOver)
  })

  it('gives 112.0 for 28 breaths of 7.0 L/min, R-RSBI-10, derived', () => {
    expect(indexOf(28, 7000 / 28)).toBe(112)
  })

  it('rises by 25.0 % from 60 to 75, R-RSBI-11, derived', () => {
    expect(changeFromBaseline(60, 75, { direction: 'rise', as: 'percent' })).toEqual({ known: true, value: 25 })
  })

  it('never divides by millilitres: 25 over 400 mL is 62.5 and not 0.0625', () => {
    expect(indexOf(25, 400)).toBe(62.5)
  })

  it.each([
    ['no rate', { breathsPerMin: null, tidalVolumeMl: 400 }, 'missing'],
    ['no volume', { breathsPerMin: 20, tidalVolumeMl: null }, 'missing'],
    ['a volume of 0', { breathsPerMin: 20, tidalVolumeMl: 0 }, 'implausible'],
    ['a volume in litres', { breathsPerMin: 20, tidalVolumeMl: 0.4 }, 'implausible'],
    ['a negative rate', { breathsPerMin: -20, tidalVolumeMl: 400 }, 'implausible'],
    ['a value that is no number', { breathsPerMin: Number.NaN, tidalVolumeMl: 400 }, 'implausible'],
  ])('does not answer with %s', (_case, readings, reason) => {
    expect(breathingIndex({ ...readings, isAdult: true })).toEqual({ known: false, reason })
  })

  it('is not computed under 18 years or with unknown age', () => {
    const readings = { breathsPerMin: 24, tidalVolumeMl: 350 }
    expect(breathingIndex({ ...readings, isAdult: false })).toEqual({ known: false, reason: 'not_adult' })
    expect(breathingIndex({ ...readings, isAdult: null })).toEqual({ known: false, reason: 'age_unknown' })
  })
})
