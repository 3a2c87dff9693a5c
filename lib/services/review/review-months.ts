import { invalidField } from '@/lib/shared/errors'
import { formatMonth } from '@/lib/shared/format'
import { shiftDay } from '@/lib/shared/time'

export const MOST_MONTHS = 24

/**
 * First and last month (yyyy-mm) of a review. Left out: up to this month, and 24 months in all.
 * Refuses, at the field: a month to come, a first month after the last, more than 24 months.
 */
export function reviewMonths(
  given: { from?: string | undefined; to?: string | undefined },
  thisMonth: string,
): { from: string; to: string } {
  const to = given.to ?? thisMonth
  const from = given.from ?? shiftMonth(to, 1 - MOST_MONTHS)
  if (to > thisMonth)
    throw invalidField('to', `This month is still to come. The last one that can be reviewed is ${formatMonth(thisMonth)}.`)
  if (from > to)
    throw invalidField('from', `The first month is after the last one, ${formatMonth(to)}. Give an earlier first month.`)
  const earliest = shiftMonth(to, 1 - MOST_MONTHS)
  if (from < earliest)
    throw invalidField('from', `A review covers ${MOST_MONTHS} months at most. Give ${formatMonth(earliest)} or later.`)
  return { from, to }
}

/** The month so many months later (or earlier), yyyy-mm. */
export function shiftMonth(month: string, months: number): string {
  const [year = 0, number = 1] = month.split('-').map(Number)
  const index = year * 12 + number - 1 + months
  return `${String(Math.floor(index / 12)).padStart(4, '0')}-${String((index % 12) + 1).padStart(2, '0')}`
}

/** The last calendar day of a month. */
export function lastDayOf(month: string): string {
  return shiftDay(`${shiftMonth(month, 1)}-01`, -1)
}
