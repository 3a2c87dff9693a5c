import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { makeDayClock } from '@/lib/services/today/day-clock'
import { listDayEntries } from '@/db/queries/day-entries'
import { decisions, episodes, holdEnds, holds, screens, trialEnds, trials } from '@/db/schema'
import { sinceDay, LONGEST_DAY_MS } from '@/lib/services/today/since-day'
import { groupDayEntries, toDayRecord } from '@/lib/services/today/to-day-record'
import { HOUR_MS } from '@/lib/shared/time'
import { nextMove } from '@/lib/weaning/next-move'
import { defaultProtocol } from '@/lib/weaning/published/default-protocol'
import { entryPlace, makeWorld, NOW, TIME_ZONE } from '../../helpers/factories'

const CALM = {
  breathsPerMin: 18,
  tidalVolumeMl: 420,
  spo2Percent: 96,
  heartRatePerMin: 84,
  systolicMmHg: 124,
  diastolicMmHg: 70,
  rass: 0,
  paCO2MmHg: null,
  paO2MmHg: null,
  ph: null,
  signs: [],
}
const DAYS = 4

// A step of the flow, some hours before NOW; holds and trials take an hour each and never overlap one of their kind.
const outcomes = <Outcome>(...ended: Outcome[]) => fc.option(fc.constantFrom(...ended), { freq: 9 })
const step = fc.oneof(
  {
    weight: 3,
    arbitrary: fc.record({
      kind: fc.constant('screen' as const),
      result: fc.constantFrom('ready' as const, 'not_ready' as const, 'incomplete' as const),
    }),
  },
  {
    weight: 1,
    arbitrary: fc.record({
      kind: fc.constant('hold' as const),
      outcome: outcomes('tolerated' as const, 'not_tolerated' as const, 'stopped' as const),
    }),
  },
  {
    weight: 1,
    arbitrary: fc.record({
      kind: fc.constant('trial' as const),
      outcome: outcomes('passed' as const, 'failed' as const, 'stopped' as const),
    }),
  },
  {
    weight: 3,
    arbitrary: fc.record({
      kind: fc.constant('decision' as const),
      choice: fc.constantFrom(
        'not_today' as const,
        'not_today' as const,
        'not_today' as const,
        'extubate' as const,
        'tracheostomy_pathway' as const,
      ),
      lookAgainInHours: fc.integer({ min: 6, max: 80 }),
    }),
  },
)
const history = fc.array(fc.record({ hoursAgo: fc.integer({ min: 2, max: DAYS * 24 - 4 }), step }), {
  minLength: 1,
  maxLength: 8,
})

describe('sinceDay', () => {
  it('reads yesterday until the window opens, then today', () => {
    const clock = (hour: number) => makeDayClock(NOW - 8 * HOUR_MS + hour * HOUR_MS, TIME_ZONE, defaultProtocol.screeningWindow)
    expect(sinceDay(clock(4.99))).toBe('2026-03-02')
    expect(sinceDay(clock(5))).toBe('2026-03-03')
  })

  it('gives the same next move as the whole history would', () => {
    const world = makeWorld()
    world.db
      .update(episodes)
      .set({ startedAt: NOW - DAYS * 24 * HOUR_MS })
      .run()
    const seen = new Set<string>()
    fc.assert(
      fc.property(history, fc.integer({ min: -8, max: 12 }), (steps, hoursFromNow) => {
        world.db.$client.exec('savepoint one_history')
        const runsUntil = { hold: Infinity, trial: Infinity }
        // Latest first: only the latest hold or trial may still run.
        for (const { hoursAgo, step: one } of [...steps].sort((a, b) => a.hoursAgo - b.hoursAgo)) {
          const at = NOW - hoursAgo * HOUR_MS
          const place = entryPlace(world.episode, world.place, at)
          if (one.kind === 'screen') {
            const verdict = {
              result: one.result,
              ruleSet: 't',
              criteria: [{ criterion: 'fio2' as const, mark: 'not_met' as const, value: 0.6, unknownBecause: null }],
            }
            world.db
              .insert(screens)
              .values({ ...place, result: one.result, verdict })
              .run()
          } else if (one.kind === 'decision') {
            world.db
              .insert(decisions)
              .values({
                ...place,
                choice: one.choice,
                reasons: [],
                lookAgainAt: one.choice === 'not_today' ? at + one.lookAgainInHours * HOUR_MS : null,
                evidence: {},
                contentHash: 'h',
                statement: 's',
              })
              .run()
          } else if (at + HOUR_MS < runsUntil[one.kind]) {
            const end = { ...entryPlace(world.episode, world.place, at + HOUR_MS), rulesMet: [] }
            const isRunning = one.outcome === null && runsUntil[one.kind] === Infinity
            runsUntil[one.kind] = at
            if (one.kind === 'hold') {
              const hold = world.db
                .insert(holds)
                .values({ ...place, start: 'started', infusions: [] })
                .returning()
                .get()
              if (!isRunning)
                world.db
                  .insert(holdEnds)
                  .values({ ...end, holdId: hold.id, outcome: one.outcome ?? 'stopped', restarts: [] })
                  .run()
            } else {
              const trial = world.db
                .insert(trials)
                .values({ ...place, technique: 't_piece', fio2Fraction: 0.4, plannedDurationMin: 30, baseline: CALM })
                .returning()
                .get()
              if (!isRunning)
                world.db
                  .insert(trialEnds)
                  .values({ ...end, trialId: trial.id, outcome: one.outcome ?? 'stopped', returnedTo: 'x' })
                  .run()
            }
          }
        }
        const now = NOW + hoursFromNow * HOUR_MS
        const clock = makeDayClock(now, TIME_ZONE, defaultProtocol.screeningWindow)
        const moveFrom = (day: string, lookFromMs: number) => {
          const grouped = groupDayEntries(listDayEntries(world.db, [world.episode.id], day, lookFromMs))
          const record = toDayRecord(
            { ...world.episode, startedAt: NOW - DAYS * 24 * HOUR_MS },
            true,
            grouped,
            () => defaultProtocol,
            now,
          )
          return nextMove({ protocol: defaultProtocol, record, clock })
        }
        const whole = moveFrom('2000-01-01', 0)
        const short = moveFrom(sinceDay(clock), now - LONGEST_DAY_MS)
        world.db.$client.exec('rollback to one_history; release one_history')
        seen.add(whole.kind === 'move' ? whole.step : whole.reason.code)
        expect(short).toEqual(whole)
      }),
      { numRuns: 250, seed: 20260303 },
    )
    expect([...seen]).toEqual(expect.arrayContaining(['screen', 'end_hold', 'end_trial', 'not_ready', 'hold', 'decide_again']))
  }, 60_000)
})
