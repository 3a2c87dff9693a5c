import { limitText } from '@/lib/weaning/limit-words'
import type { LimitedReading } from './hard-limits'

type Slip = { when: (value: number) => boolean; say: (value: number) => string }

const asText = (value: number, decimals: number) => String(Number(value.toFixed(decimals)))
const percentForFraction: Slip = {
  when: (value) => value >= 21 && value <= 100,
  say: (value) => `FiO2 is a fraction here: ${limitText(value / 100, 2)}?`,
}
const litresForMl: Slip = {
  when: (value) => value >= 0.05 && value <= 2,
  say: (value) => `Tidal volume is in mL here: ${asText(value * 1000, 0)} mL?`,
}
/** 1 kPa = 7.50062 mmHg. */
const kPaForMmHg = (from: number, below: number): Slip => ({
  when: (value) => value >= from && value < below,
  say: (value) => `This looks like kPa; it is in mmHg here: ${asText(value * 7.50062, 0)} mmHg?`,
})

const SLIPS: Partial<Record<LimitedReading, Slip[]>> = {
  fio2Fraction: [percentForFraction],
  paO2FiO2Fraction: [percentForFraction],
  tidalVolumeMl: [litresForMl],
  setTidalVolumeMl: [litresForMl],
  measuredTidalVolumeMl: [litresForMl],
  spo2Percent: [
    { when: (value) => value >= 0.4 && value <= 1, say: (value) => `SpO2 is in percent here: ${asText(value * 100, 0)} %?` },
  ],
  ph: [
    {
      when: (value) => value >= 660 && value <= 790,
      say: (value) => `The decimal point is missing: ${(value / 100).toFixed(2)}?`,
    },
  ],
  norepinephrineMcgPerKgMin: [
    {
      when: (value) => value > 5 && value <= 200,
      say: () => 'This looks like µg/min; it is per kg here: divide by the body weight in kg.',
    },
  ],
  paCO2MmHg: [kPaForMmHg(1.4, 10)],
  paO2MmHg: [kPaForMmHg(2.7, 20)],
  haemoglobinGPerDl: [
    {
      when: (value) => value > 25 && value <= 250,
      say: (value) => `Haemoglobin is in g/dL here: ${asText(value / 10, 1)} g/dL?`,
    },
  ],
  temperatureC: [
    {
      when: (value) => value >= 80 && value <= 113,
      say: (value) => `Temperature is in °C here: ${asText(((value - 32) * 5) / 9, 1)} °C?`,
    },
  ],
  heightCm: [
    { when: (value) => value >= 1 && value <= 2.5, say: (value) => `Height is in cm here: ${asText(value * 100, 0)} cm?` },
    {
      when: (value) => value >= 48 && value <= 90,
      say: (value) => `This looks like inches; height is in cm here: ${asText(value * 2.54, 0)} cm?`,
    },
  ],
}

/**
 * A question that names the likely right value when a typed number looks like another unit (percent for fraction, litres for mL,
 * kPa for mmHg, g/L, Fahrenheit, metres, inches); null when it does not. Asked only outside the hard limits' range, so no true value is refused.
 * @example suspectUnitSlip('fio2Fraction', 50) // 'FiO2 is a fraction here: 0.50?'
 */
export function suspectUnitSlip(reading: LimitedReading, value: number): string | null {
  const slip = SLIPS[reading]?.find((candidate) => candidate.when(value))
  return slip ? slip.say(value) : null
}
