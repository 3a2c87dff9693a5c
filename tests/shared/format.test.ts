import { describe, expect, it } from 'vitest'
import { formatDay, formatDuration, formatMinutes, formatMonth, formatNumber, formatTime } from '@/lib/shared/format'
import { HOUR_MS, MINUTE_MS } from '@/lib/shared/time'

const utc = (year: number, month: number, day: number, hour: number, minute = 0) => Date.UTC(year, month - 1, day, hour, minute)

describe('formatTime', () => {
  const now = utc(2026, 3, 3, 15)

  it('shows the unit’s clock alone on the unit’s day', () => {
    expect(formatTime(utc(2026, 3, 3, 12, 5), 'America/Denver', now)).toBe('05:05')
    expect(formatTime(utc(2026, 3, 3, 7, 0), 'America/Denver', now)).toBe('00:00')
  })

  it('adds the date on another day of the unit, also when UTC has the same day', () => {
    expect(formatTime(utc(2026, 3, 3, 6, 59), 'America/Denver', now)).toBe('2 Mar 23:59')
  })

  it('adds the year in another year of the unit, not of UTC', () => {
    expect(formatTime(utc(2025, 12, 31, 12), 'America/Denver', now)).toBe('31 Dec 2025 05:00')
    const newYear = utc(2027, 1, 1, 6)
    expect(formatTime(utc(2026, 12, 1, 12), 'America/Denver', newYear)).toBe('1 Dec 05:00')
  })

  it('goes by the zone: half hours, and both sides of a change of the clocks', () => {
    expect(formatTime(utc(2026, 7, 2, 21, 30), 'Australia/Lord_Howe', utc(2026, 7, 3, 0))).toBe('08:00')
    const change = utc(2026, 3, 8, 9)
    expect(formatTime(change - MINUTE_MS, 'America/Denver', change)).toBe('01:59')
    expect(formatTime(change, 'America/Denver', change)).toBe('03:00')
    const fall = utc(2026, 11, 1, 8)
    expect([fall - HOUR_MS, fall].map((ms) => formatTime(ms, 'America/Denver', fall))).toEqual(['01:00', '01:00'])
    expect(formatTime(utc(2026, 3, 8, 9, 30), 'Etc/GMT+7', change)).toBe('02:30')
    expect(formatTime(utc(2026, 3, 29, 1), 'Europe/Berlin', utc(2026, 3, 29, 1))).toBe('03:00')
  })
})

describe('formatDuration', () => {
  it.each([
    [0, '0 min'],
    [59_999, '0 min'],
    [60_000, '1 min'],
    [35 * MINUTE_MS, '35 min'],
    [HOUR_MS - 1, '59 min'],
    [HOUR_MS, '1 h'],
    [130 * MINUTE_MS, '2 h 10 min'],
    [24 * HOUR_MS, '24 h'],
    [48 * HOUR_MS - MINUTE_MS, '47 h 59 min'],
    [48 * HOUR_MS, '2 d 0 h'],
    [76 * HOUR_MS, '3 d 4 h'],
    [-35 * MINUTE_MS, '35 min'],
    [-130 * MINUTE_MS, '2 h 10 min'],
  ])('says %d ms as %s', (ms, text) => {
    expect(formatDuration(ms)).toBe(text)
  })
})

describe('days, months, minutes and numbers', () => {
  it('writes a day and a month in words', () => {
    expect(formatDay('2026-12-01')).toBe('1 Dec 2026')
    expect(formatDay('2028-02-29')).toBe('29 Feb 2028')
    expect(formatMonth('2026-12')).toBe('Dec 2026')
    expect(formatMonth('2026-01')).toBe('Jan 2026')
  })

  it.each([
    [0, '00:00'],
    [5, '00:05'],
    [300, '05:00'],
    [540, '09:00'],
    [1439, '23:59'],
  ])('writes %d minutes after midnight as %s', (minutes, text) => {
    expect(formatMinutes(minutes)).toBe(text)
  })

  it('keeps the asked decimals, and writes a true minus sign', () => {
    expect(formatNumber(0.5, 2)).toBe('0.50')
    expect(formatNumber(105.04, 0)).toBe('105')
    expect(formatNumber(-3, 0)).toBe('\u22123')
    expect(formatNumber(-0, 1)).toBe('0.0')
  })
})
