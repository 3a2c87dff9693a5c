import { describe, expect, it } from 'vitest'
import { countUnitDays, type ReviewEpisode, type ReviewStay } from '@/lib/weaning/course/count-unit-days'
import type { ReviewDay } from '@/lib/weaning/course/monthly-measures'

const HOUR = 3_600_000
const DAY = 24 * HOUR
const START = Date.UTC(2026, 5, 1)

/** Plain days of 24 hours from 1 June 2026, screening until 09:00. */
const plainDays = (count: number): ReviewDay[] =>
  Array.from({ length: count }, (_, index) => ({
    day: `2026-06-${String(index + 1).padStart(2, '0')}`,
    startMs: START + index * DAY,
    endMs: START + (index + 1) * DAY,
    closesMs: START + index * DAY + 9 * HOUR,
  }))

/** "D2 10:00" of the case as a moment; null for before and after the five days. */
const at = (day: number, time = '00:00') => {
  const [hours = 0, minutes = 0] = time.split(':').map(Number)
  return START + (day - 1) * DAY + hours * HOUR + minutes * 60_000
}
const BEFORE = at(1) - 5 * DAY

const stay = (patientId: string, startMs: number, endMs: number | null, unitId = 'A'): ReviewStay => ({
  patientId,
  unitId,
  startMs,
  endMs,
})
const ventilation = (patientId: string, startMs: number, endMs: number | null): ReviewEpisode => ({
  episodeId: `${patientId}-${startMs}`,
  patientId,
  startMs,
  endMs,
  birthDate: '1960-01-01',
})

function count(stays: ReviewStay[], episodes: ReviewEpisode[], days = plainDays(5), nowMs = at(6) - 1, unitId = 'A') {
  const found = countUnitDays({ unitId, days, nowMs, stays, episodes })
  return {
    patientDays: found.patientDays.get('2026-06') ?? 0,
    ventilatorDays: found.ventilatorDays.get('2026-06') ?? 0,
    ventilated: found.ventilated,
  }
}

describe('a worked census, any part of the day (derived)', () => {
  const stays = [
    stay('A', BEFORE, at(4, '15:00')),
    stay('B', at(1, '09:30'), null),
    stay('C', at(2, '07:00'), at(3, '12:00')),
    stay('D', BEFORE, at(2, '23:30')),
    stay('E', at(3, '23:50'), null),
    stay('F', BEFORE, null),
  ]
  const episodes = [
    ventilation('A', BEFORE, at(2, '10:00')),
    ventilation('A', at(2, '20:00'), at(4, '07:30')),
    ventilation('B', at(1, '09:30'), at(1, '19:00')),
    ventilation('C', at(2, '05:00'), null),
    ventilation('D', at(2, '09:00'), at(2, '23:30')),
    ventilation('E', at(4, '00:10'), null),
    ventilation('F', at(5, '08:00'), null),
  ]
  it('counts 21 patient days', () => expect(count(stays, episodes).patientDays).toBe(21))
  it('counts 11 ventilator days, two episodes on one day once', () => expect(count(stays, episodes).ventilatorDays).toBe(11))
  it('counts the same whatever the order of the rows', () =>
    expect(count([...stays].reverse(), [...episodes].reverse())).toMatchObject({ patientDays: 21, ventilatorDays: 11 }))
})

describe('the edges of a day', () => {
  it('counts both days of a run over midnight', () => {
    const one = count([stay('A', at(1), null)], [ventilation('A', at(1, '23:59'), at(2, '00:01'))])
    expect(one.ventilatorDays).toBe(2)
  })
  it('does not count the day that begins as the run ends', () => {
    expect(count([stay('A', at(1), null)], [ventilation('A', at(1, '20:00'), at(2))]).ventilatorDays).toBe(1)
  })
  it('counts the day of a run that begins at midnight', () => {
    expect(count([stay('A', at(1), null)], [ventilation('A', at(2), at(2, '00:01'))]).ventilatorDays).toBe(1)
  })
  it('counts a run that ended in the minute it began once', () => {
    expect(count([stay('A', at(1), null)], [ventilation('A', at(2, '10:00'), at(2, '10:00'))]).ventilatorDays).toBe(1)
  })
  it('counts an open run up to now and no further', () => {
    expect(
      count([stay('A', at(1), null)], [ventilation('A', at(1, '10:00'), null)], plainDays(5), at(3, '08:00')).ventilatorDays,
    ).toBe(3)
  })
  it('ignores what lies before the first day', () => {
    expect(count([stay('A', BEFORE, at(1))], [ventilation('A', BEFORE, at(1))])).toMatchObject({
      patientDays: 0,
      ventilatorDays: 0,
    })
  })
  it('counts the days of both clock changes once each', () => {
    const long: ReviewDay[] = [
      { day: '2026-06-01', startMs: START, endMs: START + 25 * HOUR, closesMs: START + 10 * HOUR },
      { day: '2026-06-02', startMs: START + 25 * HOUR, endMs: START + 48 * HOUR, closesMs: START + 33 * HOUR },
    ]
    const stays = [stay('A', START, null)]
    // 24.5 hours after the first midnight it is still the first day; the second day is an hour short.
    expect(
      count(stays, [ventilation('A', START + 24.5 * HOUR, START + 25 * HOUR)], long, START + 48 * HOUR).ventilated.map(
        ({ day }) => day.day,
      ),
    ).toEqual(['2026-06-01'])
    expect(
      count(stays, [ventilation('A', START + 25 * HOUR, START + 47 * HOUR)], long, START + 48 * HOUR).ventilated.map(
        ({ day }) => day.day,
      ),
    ).toEqual(['2026-06-02'])
  })
  it('answers zero for a unit without patients', () => expect(count([], [])).toMatchObject({ patientDays: 0, ventilatorDays: 0 }))
})

describe('moves between units', () => {
  const stays = [stay('A', at(1, '08:00'), at(3, '14:00'), 'A'), stay('A', at(3, '14:00'), null, 'B')]
  const episodes = [ventilation('A', at(1, '09:00'), null)]
  it('gives the day of the move to the unit where the patient was last', () => {
    expect(count(stays, episodes, plainDays(5), at(6) - 1, 'A')).toMatchObject({ patientDays: 2, ventilatorDays: 2 })
    expect(count(stays, episodes, plainDays(5), at(6) - 1, 'B')).toMatchObject({ patientDays: 3, ventilatorDays: 3 })
  })
  it('gives a day of moving there and back to the first unit', () => {
    const backAgain = [
      stay('A', at(1), at(2, '08:00'), 'A'),
      stay('A', at(2, '08:00'), at(2, '20:00'), 'B'),
      stay('A', at(2, '20:00'), null, 'A'),
    ]
    expect(count(backAgain, episodes, plainDays(2), at(3) - 1, 'A').ventilatorDays).toBe(2)
    expect(count(backAgain, episodes, plainDays(2), at(3) - 1, 'B').ventilatorDays).toBe(0)
  })
  it('gives a move at midnight wholly to the new unit', () => {
    const moved = [stay('A', at(1), at(2), 'A'), stay('A', at(2), null, 'B')]
    expect(count(moved, episodes, plainDays(2), at(3) - 1, 'A').patientDays).toBe(1)
    expect(count(moved, episodes, plainDays(2), at(3) - 1, 'B').patientDays).toBe(1)
  })
  it('never counts more ventilator days than patient days', () => {
    const extubatedThenMoved = [ventilation('A', at(1, '09:00'), at(3, '10:00'))]
    expect(count(stays, extubatedThenMoved, plainDays(5), at(6) - 1, 'B')).toMatchObject({ patientDays: 3, ventilatorDays: 1 })
  })
})
