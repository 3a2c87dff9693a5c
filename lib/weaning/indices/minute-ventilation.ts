import { ageReason, computedReading, unknownReading } from '@/lib/weaning/answer'
import { plausibleReading } from '@/lib/weaning/published/plausible-reading'
import type { Reading } from '@/lib/weaning/readings'

/**
 * Minute ventilation (VE), L/min.
 * Variant: total, breathing frequency × tidal volume in litres, dead space included. Source: definition.
 * @example minuteVentilation({ breathsPerMin: 18, tidalVolumeMl: 450, isAdult: true }) // { known: true, value: 8.1 }
 */
export function minuteVentilation(input: {
  breathsPerMin: number | null
  tidalVolumeMl: number | null
  isAdult: boolean | null
}): Reading {
  const age = ageReason(input.isAdult)
  if (age !== null) return unknownReading(age)
  const rate = plausibleReading('breathsPerMin', input.breathsPerMin)
  const volume = plausibleReading('tidalVolumeMl', input.tidalVolumeMl)
  if (!rate.known) return rate
  if (!volume.known) return volume
  return computedReading((rate.value * volume.value) / 1000)
}
