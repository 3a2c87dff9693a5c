import { unknownReading } from '@/lib/weaning/answer'
import type { Reading } from '@/lib/weaning/readings'
import { HARD_LIMITS, type LimitedReading } from './hard-limits'

/**
 * A typed value as an answer: missing when null, implausible outside the hard limits of its kind (a FiO2 of 40, a tidal volume of 0.4 mL).
 * Source of the limits: common practice, no source.
 * @example plausibleReading('fio2Fraction', 40) // { known: false, reason: 'implausible' }
 */
export function plausibleReading(reading: LimitedReading, value: number | null): Reading {
  if (value === null) return unknownReading('missing')
  const { hardMin, hardMax, isWhole } = HARD_LIMITS[reading]
  const isPossible = value >= hardMin && value <= hardMax && (!isWhole || Number.isInteger(value))
  return isPossible ? { known: true, value } : unknownReading('implausible')
}
