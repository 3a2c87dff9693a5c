/**
 * Whether the indices and criteria apply: 18 years or older. null when the age is unknown or impossible.
 * Source: the product's scope (adults only); the published lists used here were made in adults.
 * @example isAdult(17) // false
 */
export function isAdult(ageYears: number | null): boolean | null {
  if (ageYears === null || !Number.isFinite(ageYears) || ageYears < 0 || ageYears > 130) return null
  return ageYears >= 18
}
