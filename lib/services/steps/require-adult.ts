import type { EpisodeInUnit } from '@/lib/access/door'
import { AppError } from '@/lib/shared/errors'
import { ageYears } from '@/lib/shared/time'
import { isAdult } from '@/lib/weaning/indices/is-adult'

/** Whether the patient is an adult on a calendar day (yyyy-mm-dd); null when the birth date is unknown. */
export function isAdultOn({ patient }: Pick<EpisodeInUnit, 'patient'>, day: string): boolean | null {
  return isAdult(ageYears(patient.birthDate, day))
}

/** Refuses what is judged by criteria for anyone who is not known to be an adult. */
export function requireAdult(found: Pick<EpisodeInUnit, 'patient'>, day: string): void {
  const answer = isAdultOn(found, day)
  if (answer === true) return
  if (answer === null) {
    throw new AppError(
      'PRECONDITION',
      'The birth date is not known. Criteria are for adults only, so enter it first. Nothing was recorded.',
    )
  }
  throw new AppError(
    'PRECONDITION',
    'This patient is under 18 years. Criteria and limits come from adults and are not computed here. Nothing was recorded.',
  )
}
