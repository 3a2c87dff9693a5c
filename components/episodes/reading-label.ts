import { HARD_LIMITS, type LimitedReading } from '@/lib/weaning/published/hard-limits'
import { sentenceCase } from '@/lib/weaning/sentence-case'

/** The name of a reading as a field's label: "Respiratory rate", "FiO2", "pH". */
export function readingLabel(reading: LimitedReading): string {
  return sentenceCase(HARD_LIMITS[reading].label.replace(/^the /, ''))
}

/** The unit that stands inside the field. */
export function readingUnit(reading: LimitedReading): string {
  const { unit } = HARD_LIMITS[reading]
  return unit === 'as a fraction' ? 'fraction' : unit
}

/** A value of this reading in text, with its usual decimals and never fewer than it has. */
export function readingText(reading: LimitedReading, value: number): string {
  const { decimals } = HARD_LIMITS[reading]
  const fixed = value.toFixed(decimals)
  const text = Number(fixed) === value ? fixed : String(value)
  return `${reading === 'rass' && value > 0 ? '+' : ''}${text}`.replace('-', '\u2212')
}
