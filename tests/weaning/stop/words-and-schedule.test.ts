import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { defaultProtocol } from '@/lib/weaning/published/default-protocol'
import { stopBoles2007 } from '@/lib/weaning/published/stop-boles-2007'
import { describeRule } from '@/lib/weaning/stop/describe-rule'
import { nextObservation } from '@/lib/weaning/stop/next-observation'

const { observationMinutes } = defaultProtocol.trial
const START = 1_000_000 * 60_000
const next = (observed: number[], plannedDurationMin = 30) =>
  nextObservation({
    startedMs: START,
    plannedDurationMin,
    observationMinutes,
    observedMs: observed.map((minute) => START + minute * 60_000),
  })

describe('nextObservation', () => {
  it.each([
    [[], 2],
    [[0], 2],
    [[1], 2],
    [[2], 5],
    [[3], 5],
    [[4], 5],
    [[5], 10],
    [[8], 10],
    [[9], 15],
    [[12], 15],
    [[2, 5, 10, 15], 30],
    [[27], 30],
    [[28], null],
    [[30], null],
    [[45], null],
  ])('after looks at minutes %j owes minute %s of a trial of 30 min', (observed, minute) => {
    expect(next(observed)?.minute ?? null).toBe(minute)
  })

  it('does not owe minute 2 any more after a look at minute 11', () => {
    expect(next([11])).toEqual({ minute: 15, dueMs: START + 15 * 60_000 })
  })

  it('goes on to 120 min for a trial of 120 min and closes at a planned end that is not on the schedule', () => {
    expect(next([90], 120)?.minute).toBe(105)
    expect(next([30], 40)?.minute).toBe(40)
    expect(next([118], 120)).toBe(null)
  })

  it('reads looks in any order and ignores one before the start', () => {
    expect(next([15, 2])?.minute).toBe(30)
    expect(next([-5])?.minute).toBe(2)
  })

  it('never owes a minute that a look has passed, and owes the planned end last', () => {
    fc.assert(
      fc.property(fc.array(fc.integer({ min: 0, max: 130 })), fc.integer({ min: 30, max: 120 }), (observed, planned) => {
        const owed = next(observed, planned)
        const last = Math.max(0, ...observed)
        if (owed === null) expect(last).toBeGreaterThanOrEqual(planned - 2)
        else {
          expect(owed.minute).toBeGreaterThan(last)
          expect(owed.minute).toBeLessThanOrEqual(planned)
          expect(owed.dueMs).toBe(START + owed.minute * 60_000)
        }
      }),
    )
  })
})

describe('describeRule', () => {
  it('says the rules of Boles 2007 in plain words', () => {
    expect(stopBoles2007.rules.map(({ rule }) => describeRule(rule))).toEqual([
      'agitation',
      'anxiety',
      'depressed mental state',
      'sweating',
      'cyanosis',
      'accessory muscles in use',
      'marked dyspnoea',
      'SpO2 below 90 %',
      'PaCO2 above 50 mmHg',
      'PaCO2 up more than 8 mmHg from baseline',
      'pH below 7.32',
      'pH down 0.07 or more from baseline',
      'RSBI above 105 /min/L',
      'respiratory rate above 35 /min',
      'respiratory rate up 50 % or more from baseline',
      'heart rate above 140 /min',
      'heart rate up 20 % or more from baseline',
      'systolic blood pressure above 180 mmHg',
      'systolic blood pressure up 20 % or more from baseline',
      'systolic blood pressure below 90 mmHg',
      'new arrhythmia',
    ])
  })
})
