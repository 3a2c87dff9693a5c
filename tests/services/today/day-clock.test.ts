import { describe, expect, it } from 'vitest'
import { makeDayClock } from '@/lib/services/today/day-clock'
import { HOUR_MS } from '@/lib/shared/time'
import { TIME_ZONE } from '../../helpers/factories'

const WINDOW = { opensMin: 300, closesMin: 540 }

describe('makeDayClock', () => {
  it('places a moment in the unit’s day and screening window', () => {
    expect(makeDayClock(Date.UTC(2026, 2, 3, 15), TIME_ZONE, WINDOW)).toEqual({
      nowMs: Date.UTC(2026, 2, 3, 15),
      day: '2026-03-03',
      previousDay: '2026-03-02',
      windowOpensMs: Date.UTC(2026, 2, 3, 12),
      windowClosesMs: Date.UTC(2026, 2, 3, 16),
      dayEndsMs: Date.UTC(2026, 2, 4, 7),
    })
  })

  it('changes the day at the unit’s midnight, not at the server’s', () => {
    expect(makeDayClock(Date.UTC(2026, 2, 4, 6, 59), TIME_ZONE, WINDOW).day).toBe('2026-03-03')
    expect(makeDayClock(Date.UTC(2026, 2, 4, 7), TIME_ZONE, WINDOW)).toMatchObject({
      day: '2026-03-04',
      previousDay: '2026-03-03',
    })
  })

  it('keeps the window on the wall clock through both clock changes', () => {
    const spring = makeDayClock(Date.UTC(2026, 2, 8, 18), TIME_ZONE, WINDOW)
    expect(spring).toMatchObject({ windowOpensMs: Date.UTC(2026, 2, 8, 11), windowClosesMs: Date.UTC(2026, 2, 8, 15) })
    expect(spring.dayEndsMs - Date.UTC(2026, 2, 8, 7)).toBe(23 * HOUR_MS)
    const autumn = makeDayClock(Date.UTC(2026, 10, 1, 18), TIME_ZONE, WINDOW)
    expect(autumn).toMatchObject({ windowOpensMs: Date.UTC(2026, 10, 1, 12), windowClosesMs: Date.UTC(2026, 10, 1, 16) })
    expect(autumn.dayEndsMs - Date.UTC(2026, 10, 1, 6)).toBe(25 * HOUR_MS)
  })
})
