import { unknownReading } from '@/lib/weaning/answer'
import type { Reading } from '@/lib/weaning/readings'

/**
 * The rate at which a held infusion is restarted after a hold that was not tolerated, in the unit of the rate before.
 * Variant: a fraction of the rate before (published: half), not rounded; rounding is for display only.
 * Source: awakening trial of Girard 2008, doi:10.1016/S0140-6736(08)60105-1 (from a later reuse of that protocol).
 * @example restartDose({ rateBefore: 30, restartFraction: 0.5 }) // { known: true, value: 15 }
 */
export function restartDose(input: { rateBefore: number | null; restartFraction: number }): Reading {
  const { rateBefore, restartFraction } = input
  if (rateBefore === null) return unknownReading('missing')
  const isPossible = Number.isFinite(rateBefore) && rateBefore > 0 && restartFraction > 0 && restartFraction <= 1
  return isPossible ? { known: true, value: rateBefore * restartFraction } : unknownReading('implausible')
}
