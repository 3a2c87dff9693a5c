import { describe, expect, it } from 'vitest'
import { resolveObserved } from '@/lib/services/entries/resolve-observed'
import { toEntryDto } from '@/lib/services/entries/to-entry-dto'
import { listUnlikely } from '@/lib/schemas/reading'
import { HOUR_MS, MINUTE_MS } from '@/lib/shared/time'
import { NOW, TIME_ZONE, TODAY } from '../../helpers/factories'
import { expectRefusal } from '../../helpers/verb-checks'

const LATER = Date.UTC(2026, 11, 31)

describe('resolveObserved', () => {
  it('takes the wall clock of the unit', () => {
    expect(resolveObserved({ day: TODAY, time: '07:40' }, TIME_ZONE, NOW)).toBe(NOW - 20 * MINUTE_MS)
    expect(resolveObserved({ day: '2026-07-01', time: '12:00' }, TIME_ZONE, LATER)).toBe(Date.UTC(2026, 6, 1, 18))
    expect(resolveObserved({ day: '2026-07-01', time: '12:00' }, 'Asia/Kathmandu', LATER)).toBe(Date.UTC(2026, 6, 1, 6, 15))
  })

  it('takes the present minute and refuses the one after the next', () => {
    expect(resolveObserved({ day: TODAY, time: '08:00' }, TIME_ZONE, NOW)).toBe(NOW)
    expect(resolveObserved({ day: TODAY, time: '08:01' }, TIME_ZONE, NOW)).toBe(NOW + MINUTE_MS)
    expectRefusal(
      () => resolveObserved({ day: TODAY, time: '08:02' }, TIME_ZONE, NOW),
      'INVALID',
      'observed.time',
      /future\. It is 08:00 now/,
    )
  })

  it('refuses a day that does not exist', () => {
    expectRefusal(() => resolveObserved({ day: '2026-02-29', time: '08:00' }, TIME_ZONE, NOW), 'INVALID', 'observed.day')
    expectRefusal(() => resolveObserved({ day: '2026-13-01', time: '08:00' }, TIME_ZONE, NOW), 'INVALID', 'observed.day')
    expect(resolveObserved({ day: '2024-02-29', time: '08:00' }, TIME_ZONE, NOW)).toBe(Date.UTC(2024, 1, 29, 15))
  })

  it('refuses the hour that was skipped on 8 March 2026, and takes the minutes on either side', () => {
    const spring = (time: string) => resolveObserved({ day: '2026-03-08', time }, TIME_ZONE, LATER)
    expectRefusal(() => spring('02:30'), 'INVALID', 'observed.time', /clocks went forward on 8 Mar 2026: 02:30 did not exist/)
    expect(spring('03:00') - spring('01:59')).toBe(MINUTE_MS)
  })

  it('asks which one in the hour that came twice on 1 November 2026', () => {
    const autumn = (time: string, fold?: 'first' | 'second') =>
      resolveObserved({ day: '2026-11-01', time, fold }, TIME_ZONE, LATER)
    expectRefusal(() => autumn('01:30'), 'INVALID', 'observed.fold', /came twice/)
    expect(autumn('01:30', 'first')).toBe(Date.UTC(2026, 10, 1, 7, 30))
    expect(autumn('01:30', 'second') - autumn('01:30', 'first')).toBe(HOUR_MS)
    expect(autumn('02:00') - autumn('00:59')).toBe(2 * HOUR_MS + MINUTE_MS)
  })

  it('names the field that it was asked about', () => {
    expectRefusal(
      () => resolveObserved({ day: '2026-02-30', time: '08:00' }, TIME_ZONE, NOW, 'lookAgain'),
      'INVALID',
      'lookAgain.day',
    )
  })
})

describe('toEntryDto', () => {
  const row = {
    id: 'b',
    entryId: 'a',
    entryVersion: 2,
    amendReason: 'why',
    observedAt: NOW,
    recordedAt: NOW,
    ventilatorDay: TODAY,
  }

  it('marks an entry as late when it was recorded more than half an hour after it was observed', () => {
    expect(toEntryDto({ ...row, recordedAt: NOW + 30 * MINUTE_MS }, 'N', 1).isLate).toBe(false)
    expect(toEntryDto({ ...row, recordedAt: NOW + 30 * MINUTE_MS + 1 }, 'N', 1).isLate).toBe(true)
  })

  it('says that it was amended, by whom it was recorded and which protocol judged it', () => {
    expect(toEntryDto(row, 'Noa Nurse', 4)).toMatchObject({
      isAmended: true,
      amendReason: 'why',
      recordedByName: 'Noa Nurse',
      protocolNumber: 4,
    })
    expect(toEntryDto({ ...row, entryVersion: 1 }, 'Noa Nurse', 4).isAmended).toBe(false)
  })

  it('names the unlikely values of the row, wherever they stand', () => {
    const observed = {
      ...row,
      peepCmH2O: 22,
      readings: { spo2Percent: 79, signs: ['pain'], breathsPerMin: 18 },
      baseline: { heartRatePerMin: 190 },
    }
    expect(toEntryDto(observed, 'N', 1).unlikely).toEqual(['peepCmH2O', 'readings.spo2Percent', 'baseline.heartRatePerMin'])
  })
})

describe('listUnlikely', () => {
  it('counts neither the usual limits themselves, nor what is missing, nor what is impossible', () => {
    expect(listUnlikely({ peepCmH2O: 20, spo2Percent: 80, breathsPerMin: null, ph: 9, version: 4000, weightKg: 200.5 })).toEqual([
      'weightKg',
    ])
  })
})
