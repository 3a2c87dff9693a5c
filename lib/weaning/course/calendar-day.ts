const DAY_MS = 86_400_000

/**
 * The count of days from a fixed day to a calendar day yyyy-mm-dd, for calendar arithmetic without a time zone. Throws on anything else:
 * a day comes from our own record and a malformed one is a programmer's mistake.
 * @example calendarDayNumber('1970-01-02') // 1
 */
export function calendarDayNumber(day: string): number {
  const [, year, month, date] = /^(\d{4})-(\d{2})-(\d{2})$/.exec(day) ?? []
  const ms = Date.UTC(Number(year), Number(month) - 1, Number(date))
  if (Number.isNaN(ms) || calendarDay(ms / DAY_MS) !== day) throw new RangeError(`Not a calendar day: ${day}`)
  return ms / DAY_MS
}

/** The calendar day yyyy-mm-dd of a count of days. */
export function calendarDay(dayNumber: number): string {
  return new Date(dayNumber * DAY_MS).toISOString().slice(0, 10)
}
