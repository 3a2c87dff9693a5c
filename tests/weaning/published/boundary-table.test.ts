import { describe, expect, it } from 'vitest'
import { meetsLimit } from '@/lib/weaning/compare/meets-limit'
import { norepinephrineMcgPerMin } from '@/lib/weaning/indices/norepinephrine-mcg-per-min'
import type { ReadinessList } from '@/lib/weaning/published/readiness-list'
import { readinessBoles2007 } from '@/lib/weaning/published/readiness-boles-2007'
import { readinessEly1996 } from '@/lib/weaning/published/readiness-ely-1996'
import { readinessGirard2008 } from '@/lib/weaning/published/readiness-girard-2008'
import { stopBoles2007 } from '@/lib/weaning/published/stop-boles-2007'

/** Whether a value meets every limit that a list sets for an item. */
function passes(list: ReadinessList, item: string, value: number): boolean {
  const limits = list.items.filter((candidate) => candidate.item === item).map(({ limit }) => limit)
  expect(limits.length).toBeGreaterThan(0)
  return limits.every((limit) => limit !== null && meetsLimit(value, limit))
}

function stops(ruleId: string, value: number): boolean {
  const found = stopBoles2007.rules.find(({ rule }) => rule.id === ruleId)
  if (found?.rule.kind !== 'limit') throw new Error(`no limit rule ${ruleId}`)
  return meetsLimit(value, found.rule.limit)
}

// Boles 2007, doi:10.1183/09031936.00010206, read in the paper. Girard 2008 and Ely 1996 from memory.
describe('the boundary table of published limits', () => {
  it('fails an RSBI of exactly 105 by Boles readiness, passes it by Ely (from memory), and does not call it failure of a trial', () => {
    expect(passes(readinessBoles2007, 'RSBI', 105)).toBe(false)
    expect(passes(readinessBoles2007, 'RSBI', 104.9)).toBe(true)
    expect(passes(readinessEly1996, 'RSBI', 105)).toBe(true)
    expect(passes(readinessEly1996, 'RSBI', 105.04)).toBe(false)
    expect(stops('rsbi_high', 105)).toBe(false)
    expect(stops('rsbi_high', 105.04)).toBe(true)
  })

  it('passes a PEEP of 8 by Boles and by Girard (from memory), and fails it by Ely (from memory)', () => {
    expect(passes(readinessBoles2007, 'PEEP', 8)).toBe(true)
    expect(passes(readinessGirard2008, 'PEEP', 8)).toBe(true)
    expect(passes(readinessEly1996, 'PEEP', 8)).toBe(false)
    expect(passes(readinessEly1996, 'PEEP', 5)).toBe(true)
    expect(passes(readinessBoles2007, 'PEEP', 8.1)).toBe(false)
  })

  it('passes a P/F of 150 by Boles, and 200 by Ely (from memory)', () => {
    expect(passes(readinessBoles2007, 'P/F ratio', 150)).toBe(true)
    expect(passes(readinessBoles2007, 'P/F ratio', 149.9)).toBe(false)
    expect(passes(readinessEly1996, 'P/F ratio', 200)).toBe(true)
    expect(passes(readinessEly1996, 'P/F ratio', 170)).toBe(false)
  })

  it('passes a heart rate of 140 by Boles readiness, and needs more than 140 for failure of a trial', () => {
    expect(passes(readinessBoles2007, 'heart rate', 140)).toBe(true)
    expect(passes(readinessBoles2007, 'heart rate', 142)).toBe(false)
    expect(stops('heart_rate_high', 140)).toBe(false)
    expect(stops('heart_rate_high', 141)).toBe(true)
  })

  it.each([
    [0.025, 80, false],
    [0.02, 80, true],
    [0.03, 70, false],
  ])(
    'judges norepinephrine %s µg/kg/min at %s kg by Girard (from memory): passes %s, since 2 µg/min exactly fails',
    (dose, kg, expected) => {
      const perMin = norepinephrineMcgPerMin({ mcgPerKgMin: dose, weightKg: kg })
      expect(perMin.known && passes(readinessGirard2008, 'norepinephrine', perMin.value)).toBe(expected)
    },
  )

  it.each([
    ['FiO2', 0.5, true],
    ['FiO2', 0.51, false],
    ['SpO2', 88, true],
    ['SpO2', 87, false],
    ['dopamine or dobutamine', 5, false],
  ])('judges %s of %s by Girard (from memory): passes %s', (item, value, expected) => {
    expect(passes(readinessGirard2008, item, value)).toBe(expected)
  })

  it.each([
    [89, false],
    [90, true],
    [160, true],
    [161, false],
  ])('judges a systolic blood pressure of %s by Boles readiness: passes %s', (value, expected) => {
    expect(passes(readinessBoles2007, 'systolic blood pressure', value)).toBe(expected)
  })

  it('offers the oxygen limbs of Boles as alternatives', () => {
    const groups = new Set(readinessBoles2007.items.flatMap(({ either }) => (either === undefined ? [] : [either])))
    expect([...groups]).toEqual(['saturation', 'ratio'])
  })
})
