import type { ObservedReadings, ScreenReadings } from '@/lib/weaning/readings'
import type { BedsideSign } from '@/lib/weaning/vocabulary'
import type { Random } from './random'

/** How one patient is on one day. severity runs from 0 (well enough to breathe alone) to 1 (very ill). */
export type Vitals = {
  severity: number
  fio2Fraction: number
  peepCmH2O: number
  norepinephrineMcgPerKgMin: number
  breathsPerMin: number
  tidalVolumeMl: number
  spo2Percent: number
  heartRatePerMin: number
  systolicMmHg: number
  ph: number
  paCO2MmHg: number
  paO2MmHg: number
  temperatureC: number
  haemoglobinGPerDl: number
  rass: number
}

const within = (low: number, high: number, value: number) => Math.max(low, Math.min(high, value))
const rounded = (value: number, step: number) => Number((Math.round(value / step) * step).toFixed(3))

/** Values that hang together: the more ill, the more oxygen, PEEP and norepinephrine, and the less oxygen in the blood for it. Below 0.3: ready. */
export function makeVitals(random: Random, severity: number, heightCm: number): Vitals {
  const isReady = severity < 0.3
  const fio2 = rounded(0.3 + 0.46 * severity + random.between(-0.02, 0.04), 0.05)
  const pfRatio = (310 - 200 * severity) * random.between(0.88, 1.12)
  const fio2Fraction = isReady ? within(0.25, 0.45, fio2) : within(0.55, 1, fio2)
  return {
    severity,
    fio2Fraction,
    peepCmH2O: isReady ? random.whole(5, 8) : Math.round(within(8, 16, 5 + 9 * severity + random.normal(0, 1))),
    norepinephrineMcgPerKgMin: isReady
      ? random.chance(0.3)
        ? rounded(random.between(0.02, 0.08), 0.01)
        : 0
      : rounded(within(0, 0.6, random.normal(0.25 * severity, 0.08)), 0.01),
    breathsPerMin: Math.round(within(11, 32, random.normal(16 + 8 * severity, 2.5))),
    tidalVolumeMl: rounded((heightCm - 100) * random.between(5.6, 7.2), 10),
    spo2Percent: Math.round(within(89, 99, random.normal(95.5 - 3 * severity, 1.3))),
    heartRatePerMin: Math.round(within(58, 124, random.normal(78 + 22 * severity, 8))),
    systolicMmHg: Math.round(within(98, 158, random.normal(124 - 10 * severity, 11))),
    ph: rounded(within(7.2, 7.5, random.normal(7.4 - 0.09 * severity, 0.03)), 0.01),
    paCO2MmHg: Math.round(within(28, 66, random.normal(38 + 9 * severity, 4))),
    paO2MmHg: Math.round(within(52, 160, fio2Fraction * pfRatio)),
    temperatureC: rounded(within(35.8, 39.6, random.normal(37.1 + 0.7 * severity, 0.4)), 0.1),
    haemoglobinGPerDl: rounded(within(7, 15.5, random.normal(10.2, 1.5)), 0.1),
    rass: Math.round(within(-4, 1, random.normal(-0.8 - 2.6 * severity, 0.7))),
  }
}

/** What a screen finds. Of an incomplete one, one required value is left out. */
export function screenReadings(random: Random, vitals: Vitals, isIncomplete: boolean): ScreenReadings {
  const isMeasured = random.chance(0.75)
  const hasGas = random.chance(0.7)
  return {
    fio2Fraction: vitals.fio2Fraction,
    peepCmH2O: vitals.peepCmH2O,
    norepinephrineMcgPerKgMin: isIncomplete ? null : vitals.norepinephrineMcgPerKgMin,
    otherVasopressor: vitals.severity > 0.8 && random.chance(0.4),
    ischaemia: false,
    spo2Percent: vitals.spo2Percent,
    paO2MmHg: hasGas ? vitals.paO2MmHg : null,
    paO2FiO2Fraction: hasGas ? vitals.fio2Fraction : null,
    ph: hasGas ? vitals.ph : null,
    spontaneousEffort: vitals.severity < 0.3 || random.chance(0.6),
    cough: random.chance(0.8) ? random.pick(['strong', 'strong', 'weak']) : null,
    secretions: random.chance(0.8) ? random.pick(['scant', 'scant', 'moderate']) : null,
    rass: vitals.rass,
    raisedIcp: null,
    neuromuscularBlockade: null,
    temperatureC: vitals.temperatureC,
    haemoglobinGPerDl: null,
    causeImproving: null,
    breathsPerMin: isMeasured ? vitals.breathsPerMin : null,
    tidalVolumeMl: isMeasured ? vitals.tidalVolumeMl : null,
    rsbiCondition: isMeasured ? 'pressure_support' : null,
  }
}

/** One look during a hold or a trial, somewhat off the day's values. strain 0 is calm; beyond 1 the respiratory rate is over 35. */
export function observedReadings(random: Random, vitals: Vitals, strain: number, signs: BedsideSign[] = []): ObservedReadings {
  const start = within(14, 24, vitals.breathsPerMin)
  const systolicMmHg = Math.round(within(94, 172, vitals.systolicMmHg + 12 * strain + random.normal(0, 3)))
  return {
    breathsPerMin: Math.round(start + (36.2 - start) * strain + random.between(0, strain > 0.95 ? 3 : 1.5)),
    tidalVolumeMl: rounded(vitals.tidalVolumeMl * (1 - 0.35 * Math.min(1, strain)) * random.between(0.95, 1.05), 10),
    spo2Percent: Math.round(within(89, 99, vitals.spo2Percent - 2.2 * strain + random.normal(0, 0.6))),
    heartRatePerMin: Math.round(within(62, 129, vitals.heartRatePerMin * (1 + 0.12 * strain) + random.normal(0, 1.5))),
    systolicMmHg,
    diastolicMmHg: Math.round(systolicMmHg * random.between(0.52, 0.6)),
    rass: null,
    paCO2MmHg: null,
    paO2MmHg: null,
    ph: null,
    signs,
  }
}
