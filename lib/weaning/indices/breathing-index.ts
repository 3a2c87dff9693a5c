import { ageReason, computedReading, unknownReading } from '@/lib/weaning/answer'
import { plausibleReading } from '@/lib/weaning/published/plausible-reading'
import type { Reading } from '@/lib/weaning/readings'

/**
 * Rapid shallow breathing index (RSBI, f/VT), breaths per minute per litre.
 * Variant: breathing frequency divided by tidal volume in litres; published for one minute without support on room air, and read
 * lower on pressure support or CPAP, so the condition is kept with the value. Source: Yang & Tobin 1991, doi:10.1056/NEJM199105233242101.
 * @example breathingIndex({ breathsPerMin: 24, tidalVolumeMl: 350, isAdult: true }) // { known: true, value: 68.57… }
 */
export function breathingIndex(input: {
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
  return computedReading((1000 * rate.value) / volume.value)
}
