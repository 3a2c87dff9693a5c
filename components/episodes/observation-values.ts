import type { ObservedReadings } from '@/lib/weaning/readings'

export const NO_OBSERVATION: ObservedReadings = {
  breathsPerMin: null,
  tidalVolumeMl: null,
  spo2Percent: null,
  heartRatePerMin: null,
  systolicMmHg: null,
  diastolicMmHg: null,
  rass: null,
  paCO2MmHg: null,
  paO2MmHg: null,
  ph: null,
  signs: [],
}

/** The readings of an observation that are plain numbers, in the order in which they are taken at the bedside. */
export const OBSERVED_NUMBERS = [
  'breathsPerMin',
  'tidalVolumeMl',
  'spo2Percent',
  'heartRatePerMin',
  'systolicMmHg',
  'diastolicMmHg',
] as const
export const GAS_NUMBERS = ['ph', 'paCO2MmHg', 'paO2MmHg'] as const
export type ObservedNumber = (typeof OBSERVED_NUMBERS)[number] | (typeof GAS_NUMBERS)[number]
