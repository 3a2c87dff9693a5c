import { expect, test } from 'vitest'
import { clockTime, dayShifted, shortDay, wallClock } from '@/lib/client/wall-clock'

test.each([
  ['2026-12-01T08:52:00Z', 'America/Denver', '2026-12-01', '01:52'],
  ['2026-12-01T02:00:00Z', 'America/Denver', '2026-11-30', '19:00'],
  ['2026-12-01T07:00:00Z', 'America/Denver', '2026-12-01', '00:00'],
  // The hour that comes twice on 1 Nov 2026 in Denver, and the one that is skipped on 8 Mar 2026.
  ['2026-11-01T07:30:00Z', 'America/Denver', '2026-11-01', '01:30'],
  ['2026-11-01T08:30:00Z', 'America/Denver', '2026-11-01', '01:30'],
  ['2026-03-08T09:00:00Z', 'America/Denver', '2026-03-08', '03:00'],
])('shows %s in %s as %s %s', (moment, zone, day, time) => {
  expect(wallClock(Date.parse(moment), zone)).toEqual({ day, time })
})

test('names days in short and shifts them over months and leap days', () => {
  expect(shortDay('2026-12-01')).toBe('Tue 1 Dec')
  expect(dayShifted('2026-12-01', -1)).toBe('2026-11-30')
  expect(dayShifted('2028-02-28', 1)).toBe('2028-02-29')
  expect(dayShifted('2027-01-01', -1)).toBe('2026-12-31')
})

test('gives the date only when it is not today', () => {
  const now = Date.parse('2026-12-01T08:52:00Z')
  expect(clockTime(Date.parse('2026-12-01T06:05:00Z'), 'UTC', now)).toBe('06:05')
  expect(clockTime(Date.parse('2026-11-30T23:59:00Z'), 'UTC', now)).toBe('30 Nov 23:59')
})
