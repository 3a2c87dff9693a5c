import { describe, expect, test } from 'vitest'
import { parseNumber } from '@/components/forms/parse-number'

describe('text of a number field', () => {
  test.each([
    ['0.40', 0.4],
    ['0,40', 0.4],
    ['.5', 0.5],
    [',5', 0.5],
    ['8', 8],
    ['5.', 5],
    [' 24 ', 24],
    ['-2', -2],
    ['\u22122', -2],
    ['+1', 1],
    ['1450', 1450],
    ['0,405', 0.405],
    ['12,5', 12.5],
    ['1234,567', 1234.567],
  ])('reads %j as %d', (text, value) => {
    expect(parseNumber(text)).toEqual({ value, problem: null })
  })

  test.each(['', '   '])('reads %j as not assessed', (text) => {
    expect(parseNumber(text)).toEqual({ value: null, problem: null })
  })

  test.each(['abc', '1.2.3', '5 mmHg', '1e3', '--2', '.', ',', '-', '1,450.5', '0x10', 'Infinity', '1 450'])(
    'refuses %j and says what would be right',
    (text) => {
      const { value, problem } = parseNumber(text)
      expect(value).toBeNaN()
      expect(problem).toMatch(/0\.40/)
    },
  )

  test('does not guess what a comma before three digits means', () => {
    expect(parseNumber('1,450')).toEqual({
      value: NaN,
      problem: 'Write 1450 or 1.450: a comma before three digits could mean either.',
    })
  })
})
