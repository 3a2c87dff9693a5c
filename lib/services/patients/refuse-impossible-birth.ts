import { invalidField } from '@/lib/shared/errors'
import { ageYears, localDay } from '@/lib/shared/time'

const OLDEST_YEARS = 120

/** Refuses, at `birthDate`, a day after today in the unit's time zone, or more than 120 years ago. */
export function refuseImpossibleBirth(birthDate: string | null, now: number, timeZone: string): void {
  const today = localDay(now, timeZone)
  const age = ageYears(birthDate, today)
  if (birthDate === null || age === null) return
  if (birthDate > today) throw invalidField('birthDate', 'This date of birth is in the future. Look at the year.')
  if (age > OLDEST_YEARS) throw invalidField('birthDate', `This makes the patient ${age} years old. Look at the year.`)
}
