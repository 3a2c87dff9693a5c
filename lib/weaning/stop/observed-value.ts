import { breathingIndex } from '@/lib/weaning/indices/breathing-index'
import type { ObservedReading } from '@/lib/weaning/protocol'
import { plausibleReading } from '@/lib/weaning/published/plausible-reading'
import type { ObservedReadings, Reading } from '@/lib/weaning/readings'

/**
 * The value of a reading at one look: as typed and within its hard limits, or the RSBI computed from rate and volume. Adults only: the
 * caller gates by age, since no trial or hold is opened for anyone else.
 * @example observedValue('rsbi', { ...readings, breathsPerMin: 21, tidalVolumeMl: 200 }) // { known: true, value: 105 }
 */
export function observedValue(reading: ObservedReading, readings: ObservedReadings): Reading {
  if (reading !== 'rsbi') return plausibleReading(reading, readings[reading])
  return breathingIndex({ breathsPerMin: readings.breathsPerMin, tidalVolumeMl: readings.tidalVolumeMl, isAdult: true })
}
