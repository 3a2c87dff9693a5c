import type { BedsideSign, Cough, RsbiCondition, Secretions } from './vocabulary'

/** An answer that may be unknown. Missing or impossible input is an answer with a reason, never 0 and never a pass. */
export type UnknownReason = 'missing' | 'implausible' | 'not_adult' | 'age_unknown'
export type Reading = { known: true; value: number } | { known: false; reason: UnknownReason }

/** What a screen observed. null means not assessed. */
export type ScreenReadings = {
  fio2Fraction: number | null
  peepCmH2O: number | null
  norepinephrineMcgPerKgMin: number | null
  otherVasopressor: boolean | null
  ischaemia: boolean | null
  spo2Percent: number | null
  paO2MmHg: number | null
  /** FiO2 at the time of the gas; P/F uses this one. */
  paO2FiO2Fraction: number | null
  ph: number | null
  spontaneousEffort: boolean | null
  cough: Cough | null
  secretions: Secretions | null
  rass: number | null
  raisedIcp: boolean | null
  neuromuscularBlockade: boolean | null
  temperatureC: number | null
  haemoglobinGPerDl: number | null
  causeImproving: boolean | null
  breathsPerMin: number | null
  tidalVolumeMl: number | null
  rsbiCondition: RsbiCondition | null
}

/** One look at the patient during a hold or a trial, or its baseline. null means not observed. */
export type ObservedReadings = {
  breathsPerMin: number | null
  tidalVolumeMl: number | null
  spo2Percent: number | null
  heartRatePerMin: number | null
  systolicMmHg: number | null
  diastolicMmHg: number | null
  rass: number | null
  paCO2MmHg: number | null
  paO2MmHg: number | null
  ph: number | null
  signs: BedsideSign[]
}
