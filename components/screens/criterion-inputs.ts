import type { ScreenReadings } from '@/lib/weaning/readings'
import type { LimitedReading } from '@/lib/weaning/published/hard-limits'
import type { ScreenCriterion } from '@/lib/weaning/vocabulary'

type NumberReading = keyof ScreenReadings & LimitedReading
type YesNoReading =
  'otherVasopressor' | 'ischaemia' | 'spontaneousEffort' | 'raisedIcp' | 'neuromuscularBlockade' | 'causeImproving'

/** What has to be typed or chosen for a criterion. */
export type CriterionInput =
  | { kind: 'numbers'; readings: { name: NumberReading; label: string }[] }
  | { kind: 'yesNo'; name: YesNoReading }
  | { kind: 'word'; name: 'cough' | 'secretions' }
  | { kind: 'rass'; name: 'rass' }

export const CRITERION_INPUTS: Record<ScreenCriterion, CriterionInput> = {
  fio2: { kind: 'numbers', readings: [{ name: 'fio2Fraction', label: 'FiO2' }] },
  peep: { kind: 'numbers', readings: [{ name: 'peepCmH2O', label: 'PEEP' }] },
  norepinephrine: {
    kind: 'numbers',
    readings: [{ name: 'norepinephrineMcgPerKgMin', label: 'Norepinephrine dose, 0 when none runs' }],
  },
  otherVasopressor: { kind: 'yesNo', name: 'otherVasopressor' },
  ischaemia: { kind: 'yesNo', name: 'ischaemia' },
  spo2: { kind: 'numbers', readings: [{ name: 'spo2Percent', label: 'SpO2' }] },
  pfRatio: {
    kind: 'numbers',
    readings: [
      { name: 'paO2MmHg', label: 'PaO2' },
      { name: 'paO2FiO2Fraction', label: 'FiO2 at the time of the gas' },
    ],
  },
  ph: { kind: 'numbers', readings: [{ name: 'ph', label: 'pH' }] },
  spontaneousEffort: { kind: 'yesNo', name: 'spontaneousEffort' },
  cough: { kind: 'word', name: 'cough' },
  secretions: { kind: 'word', name: 'secretions' },
  rass: { kind: 'rass', name: 'rass' },
  raisedIcp: { kind: 'yesNo', name: 'raisedIcp' },
  neuromuscularBlockade: { kind: 'yesNo', name: 'neuromuscularBlockade' },
  temperature: { kind: 'numbers', readings: [{ name: 'temperatureC', label: 'Temperature' }] },
  haemoglobin: { kind: 'numbers', readings: [{ name: 'haemoglobinGPerDl', label: 'Haemoglobin' }] },
  causeImproving: { kind: 'yesNo', name: 'causeImproving' },
  rsbi: {
    kind: 'numbers',
    readings: [
      { name: 'breathsPerMin', label: 'Respiratory rate' },
      { name: 'tidalVolumeMl', label: 'Tidal volume' },
    ],
  },
}

/** What the RSBI is computed from; asked for whether or not it is a criterion of the unit. */
export const RSBI_READINGS = [
  'breathsPerMin',
  'tidalVolumeMl',
  'rsbiCondition',
] as const satisfies readonly (keyof ScreenReadings)[]

/** The readings that a criterion needs. */
export function readingsOf(criterion: ScreenCriterion): (keyof ScreenReadings)[] {
  const input = CRITERION_INPUTS[criterion]
  return input.kind === 'numbers' ? input.readings.map(({ name }) => name) : [input.name]
}
