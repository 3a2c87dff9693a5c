import type { Reading, UnknownReason } from './readings'

/** An answer that cannot be given, with its reason. */
export function unknownReading(reason: UnknownReason): { known: false; reason: UnknownReason } {
  return { known: false, reason }
}

/** A computed value as an answer; a value that is not a finite number is implausible, so that NaN never leaves the core. */
export function computedReading(value: number): Reading {
  return Number.isFinite(value) ? { known: true, value } : unknownReading('implausible')
}

/** Why nothing is computed for this age, or null for an adult. `isAdult` is null when the age is unknown. */
export function ageReason(isAdult: boolean | null): UnknownReason | null {
  if (isAdult === true) return null
  return isAdult === false ? 'not_adult' : 'age_unknown'
}
