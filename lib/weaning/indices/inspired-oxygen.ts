import { unknownReading } from '@/lib/weaning/answer'
import { plausibleReading } from '@/lib/weaning/published/plausible-reading'
import type { Reading } from '@/lib/weaning/readings'

/** Pressure of water vapour in the airway at 37 °C, mmHg. */
const WATER_VAPOUR_MMHG = 47

/**
 * Inspired oxygen pressure in the airway (PiO2), mmHg: FiO2 × (barometric pressure − 47).
 * Variant: after saturation with water vapour at 37 °C. Source: common practice, no source. Holds at every age.
 * @example inspiredOxygen({ fio2Fraction: 0.21, barometricPressureMmHg: 760 }) // { known: true, value: 149.73 }
 */
export function inspiredOxygen(input: { fio2Fraction: number | null; barometricPressureMmHg: number | null }): Reading {
  const fraction = plausibleReading('fio2Fraction', input.fio2Fraction)
  if (!fraction.known) return fraction
  const pressure = input.barometricPressureMmHg
  if (pressure === null) return unknownReading('missing')
  if (!(pressure > WATER_VAPOUR_MMHG && pressure <= 820)) return unknownReading('implausible')
  return { known: true, value: fraction.value * (pressure - WATER_VAPOUR_MMHG) }
}
