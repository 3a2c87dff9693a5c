import { ageReason, unknownReading } from '@/lib/weaning/answer'
import { plausibleReading } from '@/lib/weaning/published/plausible-reading'
import type { UnknownReason } from '@/lib/weaning/readings'
import type { Sex } from '@/lib/weaning/vocabulary'

/** Predicted body weight in kg. Outside the range (below 140 cm) it is shown with a warning. */
export type PredictedBodyWeight =
  { known: true; value: number; isOutsideRange: boolean } | { known: false; reason: UnknownReason }

/** Below this height the formula is outside its range (derived: at 140 cm it gives 34 kg for a woman and falls by 0.91 kg per cm). */
const LOWEST_HEIGHT_CM = 140

/**
 * Predicted body weight (PBW) from height and sex, kg.
 * Variant: centimetre form, 50 (men) or 45.5 (women) + 0.91 × (height − 152.4). It differs from the inch form by up to 0.3 kg.
 * Source: ARDS Network, N Engl J Med 2000;342:1301, doi:10.1056/NEJM200005043421801; origin Devine 1974 (from memory).
 * @example predictedBodyWeight({ sex: 'male', heightCm: 175, isAdult: true }) // { known: true, value: 70.566, isOutsideRange: false }
 */
export function predictedBodyWeight(input: {
  sex: Sex | null
  heightCm: number | null
  isAdult: boolean | null
}): PredictedBodyWeight {
  const age = ageReason(input.isAdult)
  if (age !== null) return unknownReading(age)
  const height = plausibleReading('heightCm', input.heightCm)
  if (!height.known) return height
  if (input.sex === null) return unknownReading('missing')
  const value = (input.sex === 'male' ? 50 : 45.5) + 0.91 * (height.value - 152.4)
  if (value <= 0) return unknownReading('implausible')
  return { known: true, value, isOutsideRange: height.value < LOWEST_HEIGHT_CM }
}
