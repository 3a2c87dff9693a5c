import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { DayRecord } from '@/lib/weaning/day-record'
import { describeMove } from '@/lib/weaning/describe-move'
import { nextMove } from '@/lib/weaning/next-move'
import { defaultProtocol } from '@/lib/weaning/published/default-protocol'
import {
  DECISION_CHOICES,
  EPISODE_ENDS,
  EXCUSE_REASONS,
  HOLD_OUTCOMES,
  HOLD_SAFETY_ITEMS,
  HOLD_STARTS,
  SCREEN_CRITERIA,
  SCREEN_RESULTS,
  TRIAL_OUTCOMES,
} from '@/lib/weaning/vocabulary'
import { clockAt, clockMs, screenOf, TODAY, YESTERDAY } from './fixtures'

const maybe = <T>(value: fc.Arbitrary<T>) => fc.option(value, { nil: null })
const day = fc.constantFrom(TODAY, TODAY, YESTERDAY, '2026-11-29')
const moment = fc
  .integer({ min: clockMs('00:00', '2026-11-29') / 60_000, max: clockMs('23:59') / 60_000 })
  .map((minute) => minute * 60_000)
const rules = fc.subarray(['breaths_high', 'spo2_low', 'unknown_rule'])
const list = <T>(entry: fc.Arbitrary<T>) => fc.array(entry, { maxLength: 4 })

/** Anything that the types allow, sense or not. */
const anyRecord: fc.Arbitrary<DayRecord> = fc.record({
  episodeStartedMs: moment,
  episodeEndedMs: fc.option(moment, { nil: null, freq: 8 }),
  episodeEnd: maybe(fc.constantFrom(...EPISODE_ENDS)),
  isAdult: fc.constantFrom(true, true, true, true, false, null),
  screens: list(
    fc.record({
      ventilatorDay: day,
      observedMs: moment,
      result: fc.constantFrom(...SCREEN_RESULTS),
      excuse: maybe(fc.constantFrom(...EXCUSE_REASONS)),
      notMet: fc.subarray([...SCREEN_CRITERIA]),
      notAssessed: fc.subarray([...SCREEN_CRITERIA]),
    }),
  ),
  holds: list(
    fc.record({
      ventilatorDay: day,
      start: fc.constantFrom(...HOLD_STARTS),
      startedMs: moment,
      unsafeBecause: fc.subarray([...HOLD_SAFETY_ITEMS]),
      lastObservedMs: maybe(moment),
      failRulesMet: rules,
      failRulesMetMs: maybe(moment),
      opensEyesMs: maybe(moment),
      endedMs: maybe(moment),
      outcome: maybe(fc.constantFrom(...HOLD_OUTCOMES)),
    }),
  ),
  trials: list(
    fc.record({
      ventilatorDay: day,
      startedMs: moment,
      plannedDurationMin: fc.constantFrom(30, 60, 120),
      observedMs: list(moment),
      stopRulesMet: rules,
      stopRulesMetMs: maybe(moment),
      endedMs: maybe(moment),
      outcome: maybe(fc.constantFrom(...TRIAL_OUTCOMES)),
    }),
  ),
  decisions: list(
    fc.record({ ventilatorDay: day, signedMs: moment, choice: fc.constantFrom(...DECISION_CHOICES), lookAgainMs: maybe(moment) }),
  ),
})
const anyClock = fc
  .integer({ min: 0, max: 24 * 60 - 1 })
  .map((minute) => ({ ...clockAt('00:00'), nowMs: clockMs('00:00') + minute * 60_000 }))

/** Whose move each step is, written down once more. */
const ROLES = {
  rt: ['screen', 'complete_screen', 'start_trial', 'observe_trial', 'end_trial', 'extubate'],
  nurse: ['hold', 'observe_hold', 'end_hold'],
  physician: ['decide', 'decide_again'],
  unit_lead: [],
} as const
const allFinite = (value: unknown): boolean =>
  typeof value === 'number'
    ? Number.isFinite(value)
    : typeof value !== 'object' || value === null || Object.values(value).every(allFinite)

describe('nextMove on arbitrary records', () => {
  it('answers exactly one thing, by the right role, with whole times, and never throws', () => {
    fc.assert(
      fc.property(anyRecord, anyClock, (record, clock) => {
        const move = nextMove({ protocol: defaultProtocol, record, clock })
        expect(allFinite(move)).toBe(true)
        if (move.kind === 'none') {
          expect(Object.keys(move)).toEqual(['kind', 'reason'])
          return
        }
        expect(ROLES[move.role] as readonly string[]).toContain(move.step)
        expect(move.isOverdue).toBe(clock.nowMs > move.dueMs)
        expect(record.episodeEndedMs).toBe(null)
        expect(record.isAdult).toBe(true)
      }),
      { numRuns: 3000 },
    )
  })

  it('gives the same answer twice and changes nothing that it was given', () => {
    fc.assert(
      fc.property(anyRecord, anyClock, (record, clock) => {
        const before = structuredClone(record)
        const first = nextMove({ protocol: defaultProtocol, record, clock })
        expect(nextMove({ protocol: defaultProtocol, record, clock })).toEqual(first)
        expect(record).toEqual(before)
      }),
    )
  })

  it('does not depend on the order of the lists when no two entries share a time', () => {
    const timesOf = (record: DayRecord) => [
      ...record.screens.map(({ observedMs }) => observedMs),
      ...record.holds.map(({ startedMs }) => startedMs),
      ...record.trials.flatMap(({ startedMs, endedMs }) => [startedMs, ...(endedMs === null ? [] : [endedMs])]),
      ...record.decisions.map(({ signedMs }) => signedMs),
    ]
    const distinct = anyRecord.filter((record) => new Set(timesOf(record)).size === timesOf(record).length)
    fc.assert(
      fc.property(distinct, anyClock, (record, clock) => {
        const { screens, holds, trials, decisions } = record
        const turned = {
          ...record,
          screens: [...screens].reverse(),
          holds: [...holds].reverse(),
          trials: [...trials].reverse(),
          decisions: [...decisions].reverse(),
        }
        expect(nextMove({ protocol: defaultProtocol, record: turned, clock })).toEqual(
          nextMove({ protocol: defaultProtocol, record, clock }),
        )
      }),
      { numRuns: 500 },
    )
  })

  it('always has words, and none of them is a code', () => {
    fc.assert(
      fc.property(anyRecord, anyClock, (record, clock) => {
        const { title, detail, lateness } = describeMove(
          nextMove({ protocol: defaultProtocol, record, clock }),
          () => '09:12',
          clock.nowMs,
        )
        expect(title.length).toBeGreaterThan(3)
        expect(detail.length).toBeGreaterThan(3)
        expect(`${title} ${detail} ${lateness ?? ''}`).not.toMatch(/_|undefined|null|NaN/)
      }),
      { numRuns: 1000 },
    )
  })

  it('never starts a trial from a screen that is not ready', () => {
    fc.assert(
      fc.property(anyRecord, anyClock, fc.constantFrom('not_ready', 'incomplete', 'excused'), (record, clock, result) => {
        const onlyScreen = { ...record, screens: [screenOf('06:00', { result })], trials: [], decisions: [] }
        const move = nextMove({ protocol: defaultProtocol, record: onlyScreen, clock })
        expect(move.kind === 'move' && (move.step === 'start_trial' || move.step === 'hold')).toBe(false)
      }),
      { numRuns: 500 },
    )
  })
})
