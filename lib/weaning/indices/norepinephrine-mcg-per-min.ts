import { computedReading } from '@/lib/weaning/answer'
import { plausibleReading } from '@/lib/weaning/published/plausible-reading'
import type { Reading } from '@/lib/weaning/readings'

/**
 * A norepinephrine dose in µg/min from µg/kg/min and body weight in kg, for lists that set their limit without the weight.
 * Variant: by the weight used for dosing, not by predicted body weight. Source: definition.
 * @example norepinephrineMcgPerMin({ mcgPerKgMin: 0.025, weightKg: 80 }) // { known: true, value: 2 }
 */
export function norepinephrineMcgPerMin(input: { mcgPerKgMin: number | null; weightKg: number | null }): Reading {
  const dose = plausibleReading('norepinephrineMcgPerKgMin', input.mcgPerKgMin)
  const weight = plausibleReading('weightKg', input.weightKg)
  if (!dose.known) return dose
  if (!weight.known) return weight
  return computedReading(dose.value * weight.value)
}
