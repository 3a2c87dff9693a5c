import { unknownReading } from '@/lib/weaning/answer'
import { breathingIndex } from '@/lib/weaning/indices/breathing-index'
import { pfRatio } from '@/lib/weaning/indices/pf-ratio'
import type { NumericCriterion, WordCriterion, YesNoCriterion } from '@/lib/weaning/protocol'
import type { LimitedReading } from '@/lib/weaning/published/hard-limits'
import { plausibleReading } from '@/lib/weaning/published/plausible-reading'
import type { ScreenReadings, UnknownReason } from '@/lib/weaning/readings'
import type { ScreenCriterion } from '@/lib/weaning/vocabulary'

/** What a criterion compares, or why there is nothing to compare. */
export type CriterionValue = { known: true; value: number | boolean | string } | { known: false; reason: UnknownReason }

/** The reading behind each number that is compared as it was typed. */
const TYPED = {
  fio2: 'fio2Fraction',
  peep: 'peepCmH2O',
  norepinephrine: 'norepinephrineMcgPerKgMin',
  spo2: 'spo2Percent',
  ph: 'ph',
  rass: 'rass',
  temperature: 'temperatureC',
  haemoglobin: 'haemoglobinGPerDl',
} as const satisfies Partial<Record<NumericCriterion, keyof ScreenReadings & LimitedReading>>

/**
 * The value that a criterion compares, from what the screen observed: typed numbers within their hard limits, P/F and RSBI computed,
 * words and yes/no as given. Nothing is rounded, nothing missing is assumed.
 * @example criterionValue('rsbi', { ...readings, breathsPerMin: 30, tidalVolumeMl: 300 }) // { known: true, value: 100 }
 */
export function criterionValue(criterion: ScreenCriterion, readings: ScreenReadings): CriterionValue {
  switch (criterion) {
    case 'fio2':
    case 'peep':
    case 'norepinephrine':
    case 'spo2':
    case 'ph':
    case 'rass':
    case 'temperature':
    case 'haemoglobin':
      return plausibleReading(TYPED[criterion], readings[TYPED[criterion]])
    case 'pfRatio':
      return pfRatio({ paO2MmHg: readings.paO2MmHg, fio2Fraction: readings.paO2FiO2Fraction, isAdult: true })
    case 'rsbi':
      return breathingIndex({ breathsPerMin: readings.breathsPerMin, tidalVolumeMl: readings.tidalVolumeMl, isAdult: true })
    case 'cough':
    case 'secretions':
    case 'otherVasopressor':
    case 'ischaemia':
    case 'spontaneousEffort':
    case 'raisedIcp':
    case 'neuromuscularBlockade':
    case 'causeImproving':
      return given(readings, criterion)
  }
}

function given(readings: ScreenReadings, criterion: YesNoCriterion | WordCriterion): CriterionValue {
  const value = readings[criterion]
  return value === null ? unknownReading('missing') : { known: true, value }
}
