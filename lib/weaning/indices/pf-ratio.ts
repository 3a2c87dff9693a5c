import { ageReason, computedReading, unknownReading } from '@/lib/weaning/answer'
import { plausibleReading } from '@/lib/weaning/published/plausible-reading'
import type { Reading } from '@/lib/weaning/readings'

/**
 * P/F ratio: arterial oxygen pressure divided by the inspired oxygen fraction, mmHg.
 * Variant: uncorrected for altitude; FiO2 as a fraction at the time of the gas. Source: Berlin definition, doi:10.1001/jama.2012.5669.
 * @example pfRatio({ paO2MmHg: 90, fio2Fraction: 0.4, isAdult: true }) // { known: true, value: 225 }
 */
export function pfRatio(input: { paO2MmHg: number | null; fio2Fraction: number | null; isAdult: boolean | null }): Reading {
  const age = ageReason(input.isAdult)
  if (age !== null) return unknownReading(age)
  const oxygen = plausibleReading('paO2MmHg', input.paO2MmHg)
  const fraction = plausibleReading('paO2FiO2Fraction', input.fio2Fraction)
  if (!oxygen.known) return oxygen
  if (!fraction.known) return fraction
  return computedReading(oxygen.value / fraction.value)
}
