import { expect, test } from 'vitest'
import { elapsedText } from '@/components/episodes/elapsed-clock'
import { describeState } from '@/components/episodes/rule-states'
import { shortRule } from '@/components/trials/last-values'
import type { JudgedRuleDto } from '@/lib/schemas/observation'
import { MIN, NOW_MS } from '../step-fixtures'

const clock = (ms: number) => new Date(ms).toISOString().slice(11, 16)
const rule = (change: Partial<JudgedRuleDto>) =>
  ({
    id: 'r',
    words: 'respiratory rate above 35 /min for 5 min',
    source: 'a source',
    state: 'clear',
    sinceMs: null,
    metAtMs: null,
    reachedAtMs: null,
    isBeyondNow: false,
    lastValue: null,
    ...change,
  }) as JudgedRuleDto

test('a limit exceeded but not yet long enough says since when, and when to look again', () => {
  const near = rule({ state: 'near', sinceMs: NOW_MS - 3 * MIN, reachedAtMs: NOW_MS + 2 * MIN })
  expect(describeState(near, clock, NOW_MS)).toBe('limit exceeded since 07:33, long enough at 07:38: look again then')
  expect(describeState(near, clock, NOW_MS + 2 * MIN)).toBe('limit exceeded since 07:33, long enough at 07:38: look again now')
})

test('a rule without a value is said to be not judged, never to be within its limit', () => {
  expect(describeState(rule({ state: 'unknown' }), clock, NOW_MS)).toContain('not judged')
  expect(describeState(rule({ state: 'clear' }), clock, NOW_MS)).toContain('within')
})

test('a limit beside its value keeps its comparator and duration', () => {
  expect(
    shortRule({
      kind: 'limit',
      id: 'a',
      reading: 'breathsPerMin',
      limit: { comparator: 'above', value: 35 },
      sustainedMin: 5,
      source: '',
    }),
  ).toBe('limit above 35 for 5 min')
  expect(
    shortRule({
      kind: 'change',
      id: 'b',
      reading: 'heartRatePerMin',
      direction: 'rise',
      comparator: 'atLeast',
      by: 20,
      as: 'percent',
      sustainedMin: 0,
      source: '',
    }),
  ).toBe('limit up 20 % or more')
})

test('the clock counts hours, minutes and seconds, and never below zero', () => {
  expect(elapsedText(34 * MIN + 12_000)).toBe('34:12')
  expect(elapsedText(64 * MIN + 12_000)).toBe('1:04:12')
  expect(elapsedText(-5_000)).toBe('00:00')
})
