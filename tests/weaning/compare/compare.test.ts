import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { changeFromBaseline } from '@/lib/weaning/compare/change-from-baseline'
import { meetsChange } from '@/lib/weaning/compare/meets-change'
import { meetsLimit } from '@/lib/weaning/compare/meets-limit'
import { valueBesideLimit } from '@/lib/weaning/compare/value-beside-limit'

const fallOf007 = { direction: 'fall', comparator: 'atLeast', by: 0.07, as: 'absolute' } as const

describe('meetsLimit', () => {
  it.each([
    ['atMost', 104.96, true],
    ['atMost', 105, true],
    ['atMost', 105.04, false],
    ['below', 104.96, true],
    ['below', 105, false],
    ['below', 105.04, false],
    ['atLeast', 104.96, false],
    ['atLeast', 105, true],
    ['atLeast', 105.04, true],
    ['above', 104.96, false],
    ['above', 105, false],
    ['above', 105.04, true],
  ] as const)('answers %s 105 at %s with %s, whatever the display would round to', (comparator, value, expected) => {
    expect(meetsLimit(value, { comparator, value: 105 })).toBe(expected)
  })

  it('takes a computed 105 for 105: 21 breaths over 0.2 L', () => {
    expect(meetsLimit(21 / 0.2, { comparator: 'atMost', value: 105 })).toBe(true)
    expect(meetsLimit(21 / 0.2, { comparator: 'above', value: 105 })).toBe(false)
  })

  it('does not hang on binary rounding: 0.1 + 0.2 is at most 0.3', () => {
    expect(0.1 + 0.2 > 0.3).toBe(true)
    expect(meetsLimit(0.1 + 0.2, { comparator: 'atMost', value: 0.3 })).toBe(true)
    expect(meetsLimit(0.1 + 0.2, { comparator: 'above', value: 0.3 })).toBe(false)
  })

  it('meets no limit with a value that is no number', () => {
    for (const comparator of ['atMost', 'below', 'atLeast', 'above'] as const) {
      for (const value of [Number.NaN, Infinity, -Infinity]) expect(meetsLimit(value, { comparator, value: 1 })).toBe(false)
      expect(meetsLimit(1, { comparator, value: Number.NaN })).toBe(false)
    }
  })

  it('tells every pair of typed values with four decimals apart', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 7_000_000 }), fc.integer({ min: 0, max: 7_000_000 }), (a, b) => {
        expect(meetsLimit(a / 10_000, { comparator: 'atMost', value: b / 10_000 })).toBe(a <= b)
        expect(meetsLimit(a / 10_000, { comparator: 'above', value: b / 10_000 })).toBe(a > b)
      }),
    )
  })

  it('tells every RSBI of whole breaths and tenths of a millilitre apart from every whole limit', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 80 }),
        fc.integer({ min: 500, max: 20_000 }),
        fc.integer({ min: 1, max: 300 }),
        (breaths, tenthsMl, limit) => {
          const value = (1000 * breaths) / (tenthsMl / 10)
          expect(meetsLimit(value, { comparator: 'atMost', value: limit })).toBe(10_000 * breaths <= limit * tenthsMl)
        },
      ),
    )
  })
})

describe('meetsChange', () => {
  it('counts pH 7.42 to 7.35 as a fall of 0.07', () => {
    expect(meetsChange(7.42, 7.35, fallOf007)).toBe(true)
  })
  it('counts pH 7.39 to 7.32, which is 0.0699999… in binary, as a fall of 0.07', () => {
    expect(7.39 - 7.32 < 0.07).toBe(true)
    expect(meetsChange(7.39, 7.32, fallOf007)).toBe(true)
  })
  it('agrees with whole hundredths for every pair of pH values', () => {
    for (let before = 680; before <= 770; before += 1) {
      for (let now = 680; now <= 770; now += 1) {
        expect(meetsChange(before / 100, now / 100, fallOf007)).toBe(before - now >= 7)
      }
    }
  })
  it('agrees with whole numbers for every heart rate and a rise of 20 percent', () => {
    const rise = { direction: 'rise', comparator: 'atLeast', by: 20, as: 'percent' } as const
    for (let before = 20; before <= 250; before += 1) {
      for (let now = 20; now <= 250; now += 1) expect(meetsChange(before, now, rise)).toBe(5 * (now - before) >= before)
    }
  })
  it('tells "more than 8" from "8 or more"', () => {
    const change = { direction: 'rise', by: 8, as: 'absolute' } as const
    expect(meetsChange(40, 48, { ...change, comparator: 'above' })).toBe(false)
    expect(meetsChange(40, 48, { ...change, comparator: 'atLeast' })).toBe(true)
    expect(meetsChange(40, 49, { ...change, comparator: 'above' })).toBe(true)
  })
  it('cannot tell a percent of a baseline of 0, or of no number', () => {
    expect(meetsChange(0, 10, { direction: 'rise', comparator: 'atLeast', by: 20, as: 'percent' })).toBe(null)
    expect(changeFromBaseline(Number.NaN, 10, { direction: 'rise', as: 'absolute' })).toEqual({
      known: false,
      reason: 'implausible',
    })
  })
  it('gives a change the other way as negative', () => {
    expect(changeFromBaseline(100, 90, { direction: 'rise', as: 'percent' })).toEqual({ known: true, value: -10 })
  })
})

describe('valueBesideLimit', () => {
  const atMost105 = [{ comparator: 'atMost', value: 105 }] as const
  it.each([
    [58.537, '58.5'],
    [105, '105.0'],
    [105.04, '105.04'],
    [105.004, '105.004'],
  ])('shows %s beside "105 or less" as %s', (value, expected) => {
    expect(valueBesideLimit(value, 1, atMost105)).toBe(expected)
  })
  it('does not round a P/F of 149.7 up to its limit of 150', () => {
    expect(valueBesideLimit(149.7, 0, [{ comparator: 'atLeast', value: 150 }])).toBe('149.7')
  })
})
