import { calendarDayNumber } from './calendar-day'

/**
 * Which ventilator day of an episode a calendar day is: the day on which ventilation began is day 1; 0 or less for a day before that.
 * Both days are calendar days in the unit's time zone, yyyy-mm-dd. Source: definition of this product.
 * @example ventilatorDayNumber('2026-11-29', '2026-12-01') // 3
 */
export function ventilatorDayNumber(startDay: string, day: string): number {
  return calendarDayNumber(day) - calendarDayNumber(startDay) + 1
}
