import { calendarDay, calendarDayNumber } from './calendar-day'

/** First and last calendar day (yyyy-mm-dd, unit's time zone) on which a spell of invasive ventilation had any part. */
export type VentilatedSpell = { firstDay: string; lastDay: string }

/**
 * The ventilator days of one or more spells: every calendar day with any part of a spell, each once even when a patient was extubated and
 * reintubated on it, in order. A spell that ends at midnight exactly has no part of the day that begins then: the caller gives the day before.
 * Variant: any part of the calendar day; a once-a-day count at a fixed hour gives fewer. Source: definition of this product.
 * @example ventilatorDays([{ firstDay: '2026-11-30', lastDay: '2026-12-01' }]) // ['2026-11-30', '2026-12-01']
 */
export function ventilatorDays(spells: readonly VentilatedSpell[]): string[] {
  const numbers = new Set<number>()
  for (const { firstDay, lastDay } of spells) {
    const last = calendarDayNumber(lastDay)
    for (let number = calendarDayNumber(firstDay); number <= last; number += 1) numbers.add(number)
  }
  return [...numbers].sort((a, b) => a - b).map(calendarDay)
}
