import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { reintubations } from '@/lib/weaning/course/reintubations'
import { ventilatorDayNumber } from '@/lib/weaning/course/ventilator-day-number'
import { ventilatorDays } from '@/lib/weaning/course/ventilator-days'
import { AIRWAY_EVENTS, type AirwayEvent } from '@/lib/weaning/vocabulary'

const HOUR = 3_600_000
const event = (word: AirwayEvent, hours: number) => ({ event: word, atMs: hours * HOUR })
const YEAR = 8760 * HOUR

describe('ventilatorDayNumber', () => {
  it.each([
    ['2026-12-01', '2026-12-01', 1],
    ['2026-11-29', '2026-12-01', 3],
    ['2026-02-28', '2026-03-01', 2],
    ['2028-02-28', '2028-03-01', 3],
    ['2026-12-31', '2027-01-01', 2],
    ['2026-03-28', '2026-03-30', 3],
    ['2026-10-24', '2026-10-26', 3],
    ['2026-12-02', '2026-12-01', 0],
  ])('counts from %s to %s as day %s', (start, day, number) => {
    expect(ventilatorDayNumber(start, day)).toBe(number)
  })
  it.each(['2026-02-30', '2026-13-01', '1 Dec 2026', ''])('refuses %s, which is no calendar day', (day) => {
    expect(() => ventilatorDayNumber('2026-01-01', day)).toThrow(RangeError)
  })
})

describe('ventilatorDays', () => {
  it('counts every day with any part of a spell', () => {
    expect(ventilatorDays([{ firstDay: '2026-11-30', lastDay: '2026-12-02' }])).toEqual([
      '2026-11-30',
      '2026-12-01',
      '2026-12-02',
    ])
  })
  it('counts a day once when the patient was extubated and reintubated on it', () => {
    const spells = [
      { firstDay: '2026-12-03', lastDay: '2026-12-04' },
      { firstDay: '2026-12-01', lastDay: '2026-12-03' },
    ]
    expect(ventilatorDays(spells)).toEqual(['2026-12-01', '2026-12-02', '2026-12-03', '2026-12-04'])
  })
  it('counts nothing without spells', () => {
    expect(ventilatorDays([])).toEqual([])
  })
})

describe('reintubations', () => {
  const after = (hours: number) =>
    reintubations([event('intubated', -100), event('extubated', 0), event('reintubated', hours)], YEAR)[0]

  // R-XF1 to R-XF3, derived; the limits include the hour itself.
  it.each([
    ['a little under 48 h', 47.99, true, true, true],
    ['48 h exactly', 48, true, true, true],
    ['R-XF1, 50 h', 50, false, true, true],
    ['72 h exactly', 72, false, true, true],
    ['R-XF3, 160 h', 160, false, false, true],
    ['R-XF2, 168 h exactly', 168, false, false, true],
    ['168.01 h', 168.01, false, false, false],
  ])('judges %s', (_case, hours, within48h, within72h, within7d) => {
    expect(after(hours)).toMatchObject({ within48h, within72h, within7d })
    expect(after(hours)?.hoursBetween).toBeCloseTo(hours, 6)
  })

  it('does not know yet what has not had its time', () => {
    const of = (hours: number) => reintubations([event('extubated', 0)], hours * HOUR)[0]
    expect(of(48)).toMatchObject({ reintubatedMs: null, hoursBetween: null, within48h: null, within72h: null, within7d: null })
    expect(of(49)).toMatchObject({ within48h: false, within72h: null, within7d: null })
    expect(of(100)).toMatchObject({ within48h: false, within72h: false, within7d: null })
    expect(of(169)).toMatchObject({ within48h: false, within72h: false, within7d: false })
  })

  it('pairs each extubation with the tube that followed it, planned or not, in order of time', () => {
    const course = [event('reintubated', 10), event('self_extubated', 0), event('extubated', 100), event('intubated', -50)]
    expect(
      reintubations(course, YEAR).map(({ event: word, isPlanned, hoursBetween }) => [word, isPlanned, hoursBetween]),
    ).toEqual([
      ['self_extubated', false, 10],
      ['extubated', true, null],
    ])
  })

  it('does not count a tracheostomy, or time off and on the ventilator, as an extubation or a reintubation', () => {
    const course = [
      event('intubated', 0),
      event('tracheostomy_placed', 100),
      event('ventilator_off', 120),
      event('ventilator_on', 130),
    ]
    expect(reintubations(course, YEAR)).toEqual([])
    expect(reintubations([event('extubated', 0), event('ventilator_on', 5)], YEAR)[0]?.reintubatedMs).toBe(null)
  })

  it('counts a tube with which the patient comes back from elsewhere', () => {
    expect(reintubations([event('extubated', 0), event('arrived_intubated', 30)], YEAR)[0]).toMatchObject({ within48h: true })
  })

  it('gives an answer for 7 d whenever it gives one for 48 h as true, and leaves the events as they are', () => {
    const anyEvent = fc.record({ event: fc.constantFrom(...AIRWAY_EVENTS), atMs: fc.integer({ min: 0, max: YEAR }) })
    fc.assert(
      fc.property(fc.array(anyEvent, { maxLength: 12 }), fc.integer({ min: 0, max: YEAR }), (events, until) => {
        for (const { within48h, within72h, within7d, hoursBetween } of reintubations(Object.freeze(events), until)) {
          if (within48h === true) expect(within72h).toBe(true)
          if (within72h === true) expect(within7d).toBe(true)
          if (within7d === false) expect(within48h).toBe(false)
          if (hoursBetween !== null) expect(hoursBetween).toBeGreaterThanOrEqual(0)
        }
      }),
    )
  })
})
