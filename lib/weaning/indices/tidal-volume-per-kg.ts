import { computedReading, unknownReading } from '@/lib/weaning/answer'
import { plausibleReading } from '@/lib/weaning/published/plausible-reading'
import type { Reading } from '@/lib/weaning/readings'
import type { PredictedBodyWeight } from './predicted-body-weight'

/**
 * Tidal volume per kilogram of predicted body weight, mL/kg. Unknown for the reason that the predicted body weight is.
 * Variant: by predicted, never by measured weight. Source: ARDS Network 2000, doi:10.1056/NEJM200005043421801.
 * @example tidalVolumePerKg({ tidalVolumeMl: 420, predictedBodyWeight: { known: true, value: 70.566, isOutsideRange: false } }) // 5.95
 */
export function tidalVolumePerKg(input: { tidalVolumeMl: number | null; predictedBodyWeight: PredictedBodyWeight }): Reading {
  const { predictedBodyWeight: weight } = input
  if (!weight.known) return weight
  const volume = plausibleReading('tidalVolumeMl', input.tidalVolumeMl)
  if (!volume.known) return volume
  return weight.value > 0 ? computedReading(volume.value / weight.value) : unknownReading('implausible')
}
