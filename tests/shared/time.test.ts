import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import fc from 'fast-check'
import { ageYears, HOUR_MS, localDay, MINUTE_MS, shiftDay, wallClockMoments, wallClockMs } from '@/lib/shared/time'

// Offsets and transitions of 2026 in these zones as public time zone data give them.
const DENVER = 'America/Denver'
const BERLIN = 'Europe/Berlin'
/** Moves by half an hour only. */
const LORD_HOWE = 'Australia/Lord_Howe'
/** Seven hours behind UTC all year; the sign in the name is the other way round. */
const FIXED = 'Etc/GMT+7'
const ZONES = [DENVER, BERLIN, LORD_HOWE, FIXED] as const

const at = (hours: number, minutes = 0) => hours * 60 + minutes
const utc = (...parts: [number, number, number, number, number?]) =>
  Date.UTC(parts[0], parts[1] - 1, parts[2], parts[3], parts[4] ?? 0)

/** What a wall clock in the zone shows, read by the platform and not by the code under test. */
function readClock(ms: number, timeZone: string): { day: string; minutes: number } {
  const part = clockParts(timeZone).formatToParts(ms)
  const value = (type: string) => part.find((one) => one.type === type)?.value ?? ''
  return {
    day: `${value('year')}-${value('month')}-${value('day')}`,
    minutes: at(Number(value('hour')), Number(value('minute'))),
  }
}
const formats = new Map<string, Intl.DateTimeFormat>()
function clockParts(timeZone: string): Intl.DateTimeFormat {
  const known = formats.get(timeZone)
  if (known) return known
  const made = new Intl.DateTimeFormat('en-GB', {
    timeZone,
    hourCycle: 'h23',
    year: 'numeric',
    month: '2-digit',
    day: '2-digit',
    hour: '2-digit',
    minute: '2-digit',
  })
  formats.set(timeZone, made)
  return made
}

describe('localDay', () => {
  it.each([
    [DENVER, utc(2026, 3, 3, 6, 59), '2026-03-02'],
    [DENVER, utc(2026, 3, 3, 7, 0), '2026-03-03'],
    // After 8 March midnight comes an hour earlier by UTC.
    [DENVER, utc(2026, 3, 9, 5, 59), '2026-03-08'],
    [DENVER, utc(2026, 3, 9, 6, 0), '2026-03-09'],
    [BERLIN, utc(2026, 12, 31, 22, 59), '2026-12-31'],
    [BERLIN, utc(2026, 12, 31, 23, 0), '2027-01-01'],
    [LORD_HOWE, utc(2026, 6, 30, 13, 29), '2026-06-30'],
    [LORD_HOWE, utc(2026, 6, 30, 13, 30), '2026-07-01'],
    [FIXED, utc(2026, 7, 1, 6, 59), '2026-06-30'],
    [FIXED, utc(2026, 7, 1, 7, 0), '2026-07-01'],
  ])('in %s changes at local midnight (%d is %s)', (zone, ms, day) => {
    expect(localDay(ms, zone)).toBe(day)
  })
})

describe('shiftDay', () => {
  it.each([
    ['2026-03-08', 1, '2026-03-09'],
    ['2026-03-09', -1, '2026-03-08'],
    ['2026-11-01', 1, '2026-11-02'],
    ['2026-12-31', 1, '2027-01-01'],
    ['2027-01-01', -1, '2026-12-31'],
    ['2028-02-28', 1, '2028-02-29'],
    ['2026-02-28', 1, '2026-03-01'],
    ['2028-03-01', -1, '2028-02-29'],
    ['2026-06-15', 0, '2026-06-15'],
    ['2026-01-31', 365, '2027-01-31'],
  ])('takes %s by %d days to %s', (day, days, expected) => {
    expect(shiftDay(day, days)).toBe(expected)
  })

  it('comes back when shifted there and back', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 20_000 }), fc.integer({ min: -800, max: 800 }), (since1970, days) => {
        const day = new Date(since1970 * 24 * HOUR_MS).toISOString().slice(0, 10)
        const shifted = shiftDay(day, days)
        expect(shifted).toBe(new Date((since1970 + days) * 24 * HOUR_MS).toISOString().slice(0, 10))
        expect(shiftDay(shifted, -days)).toBe(day)
      }),
      { examples: [[0, 0]] },
    )
  })
})

describe('wallClockMoments', () => {
  it('gives one moment on an ordinary day', () => {
    expect(wallClockMoments('2026-03-03', at(8), DENVER)).toEqual([utc(2026, 3, 3, 15)])
    expect(wallClockMoments('2026-07-03', at(8), DENVER)).toEqual([utc(2026, 7, 3, 14)])
    expect(wallClockMoments('2026-07-03', at(8), BERLIN)).toEqual([utc(2026, 7, 3, 6)])
    expect(wallClockMoments('2026-07-03', at(8), LORD_HOWE)).toEqual([utc(2026, 7, 2, 21, 30)])
    expect(wallClockMoments('2026-01-03', at(8), LORD_HOWE)).toEqual([utc(2026, 1, 2, 21)])
    expect(wallClockMoments('2026-03-08', at(2, 30), FIXED)).toEqual([utc(2026, 3, 8, 9, 30)])
  })

  it.each([
    [DENVER, '2026-03-08', at(2), at(3), utc(2026, 3, 8, 9)],
    [BERLIN, '2026-03-29', at(2), at(3), utc(2026, 3, 29, 1)],
    [LORD_HOWE, '2026-10-04', at(2), at(2, 30), utc(2026, 10, 3, 15, 30)],
  ])(
    'in %s on %s gives none from the skipped minute on, and again from the first that follows',
    (zone, day, gapFrom, gapTo, moment) => {
      expect(wallClockMoments(day, gapFrom - 1, zone)).toEqual([moment - MINUTE_MS])
      for (const minutes of [gapFrom, gapFrom + 1, gapTo - 1]) expect(wallClockMoments(day, minutes, zone)).toEqual([])
      expect(wallClockMoments(day, gapTo, zone)).toEqual([moment])
    },
  )

  it.each([
    [DENVER, '2026-11-01', at(1), at(2), utc(2026, 11, 1, 7), utc(2026, 11, 1, 8)],
    [BERLIN, '2026-10-25', at(2), at(3), utc(2026, 10, 25, 0), utc(2026, 10, 25, 1)],
    [LORD_HOWE, '2026-04-05', at(1, 30), at(2), utc(2026, 4, 4, 14, 30), utc(2026, 4, 4, 15)],
  ])('in %s on %s gives two for each doubled minute, the earlier first', (zone, day, from, to, first, second) => {
    expect(wallClockMoments(day, from - 1, zone)).toEqual([first - MINUTE_MS])
    expect(wallClockMoments(day, from, zone)).toEqual([first, second])
    const last = (to - 1 - from) * MINUTE_MS
    expect(wallClockMoments(day, to - 1, zone)).toEqual([first + last, second + last])
    expect(wallClockMoments(day, to, zone)).toEqual([second + (to - from) * MINUTE_MS])
  })
})

describe('wallClockMs', () => {
  it('is the one moment on an ordinary day', () => {
    expect(wallClockMs('2026-03-03', at(5), DENVER)).toBe(utc(2026, 3, 3, 12))
  })

  it('takes the first of a doubled time', () => {
    expect(wallClockMs('2026-11-01', at(1, 30), DENVER)).toBe(utc(2026, 11, 1, 7, 30))
    expect(wallClockMs('2026-04-05', at(1, 45), LORD_HOWE)).toBe(utc(2026, 4, 4, 14, 45))
  })

  it('moves a skipped time forward by what was skipped', () => {
    expect(readClock(wallClockMs('2026-03-08', at(2, 30), DENVER), DENVER)).toEqual({ day: '2026-03-08', minutes: at(3, 30) })
    expect(readClock(wallClockMs('2026-03-29', at(2, 30), BERLIN), BERLIN)).toEqual({ day: '2026-03-29', minutes: at(3, 30) })
    expect(readClock(wallClockMs('2026-10-04', at(2, 10), LORD_HOWE), LORD_HOWE)).toEqual({
      day: '2026-10-04',
      minutes: at(2, 40),
    })
  })

  it('takes minutes beyond the day as the next day: hour 24 is midnight', () => {
    expect(wallClockMs('2026-03-03', at(24), DENVER)).toBe(utc(2026, 3, 4, 7))
    expect(wallClockMs('2026-03-07', at(24), DENVER)).toBe(utc(2026, 3, 8, 7))
  })
})

// The same answers are owed by a server at UTC and by a browser beside the bed, whatever zone its own clock is set to.
describe.each(['UTC', 'America/Denver', 'Australia/Lord_Howe'])('on a computer whose own zone is %s', (own) => {
  let before: string | undefined
  beforeEach(() => {
    before = process.env.TZ
    process.env.TZ = own
  })
  afterEach(() => {
    if (before === undefined) delete process.env.TZ
    else process.env.TZ = before
  })

  it('really runs there', () => {
    expect(Intl.DateTimeFormat().resolvedOptions().timeZone).toBe(own)
  })

  const roundTrips = (ms: number, zone: string) => {
    const { day, minutes } = readClock(ms, zone)
    if (localDay(ms, zone) !== day) return `localDay ${localDay(ms, zone)} instead of ${day} at ${new Date(ms).toISOString()}`
    const moments = wallClockMoments(day, minutes, zone)
    if (!moments.includes(ms)) return `no way back to ${new Date(ms).toISOString()} from ${day} ${minutes}`
    if (wallClockMs(day, minutes, zone) !== moments[0])
      return `wallClockMs is not the first moment at ${new Date(ms).toISOString()}`
    return 'ok'
  }

  it.each(ZONES)('any minute of 2026 in %s leads to its day and minute, and back', (zone) => {
    const minutesOfYear = 365 * 24 * 60
    fc.assert(
      fc.property(fc.integer({ min: 0, max: minutesOfYear - 1 }), (minute) => {
        expect(roundTrips(utc(2026, 1, 1, 0) + minute * MINUTE_MS, zone)).toBe('ok')
      }),
      { numRuns: 400 },
    )
  })

  it.each([
    [DENVER, utc(2026, 3, 8, 9)],
    [DENVER, utc(2026, 11, 1, 8)],
    [BERLIN, utc(2026, 3, 29, 1)],
    [BERLIN, utc(2026, 10, 25, 1)],
    [LORD_HOWE, utc(2026, 4, 4, 15)],
    [LORD_HOWE, utc(2026, 10, 3, 15, 30)],
    [FIXED, utc(2026, 3, 8, 9)],
  ])('every minute of the four hours around a change of the clocks in %s (%d) does', (zone, change) => {
    const wrong = []
    for (let minute = -120; minute < 120; minute += 1) {
      const answer = roundTrips(change + minute * MINUTE_MS, zone)
      if (answer !== 'ok') wrong.push(answer)
    }
    expect(wrong).toEqual([])
  })
})

describe('ageYears', () => {
  it.each([
    ['1961-05-20', '2026-05-19', 64],
    ['1961-05-20', '2026-05-20', 65],
    ['2008-03-03', '2026-03-02', 17],
    ['2008-03-03', '2026-03-03', 18],
    // Born on a leap day: a year older on 1 March of an ordinary year, on 29 February of a leap year.
    ['2008-02-29', '2026-02-28', 17],
    ['2008-02-29', '2026-03-01', 18],
    ['2008-02-29', '2028-02-28', 19],
    ['2008-02-29', '2028-02-29', 20],
    ['2026-03-03', '2026-03-03', 0],
    ['1999-12-31', '2026-01-01', 26],
  ])('of somebody born %s is on %s %d', (birth, day, years) => {
    expect(ageYears(birth, day)).toBe(years)
  })

  it('is null when the birth date is not known', () => {
    expect(ageYears(null, '2026-03-03')).toBeNull()
  })
})
