export const REVIEW_MEASURES = [
  'ventilator_days',
  'patient_days',
  'utilisation',
  'screens',
  'trials',
  'extubations',
  'reintubations',
] as const
export type ReviewMeasure = (typeof REVIEW_MEASURES)[number]

/** How a measure is counted, in the words that stand on the page and in its file. */
export type MeasureDefinition = {
  title: string
  /** Unit of the drawn value. */
  unit: string
  numerator: string
  /** null for a plain count. */
  denominator: string | null
  exclusions: string[]
  notes: string[]
}

const DAY_RULE = 'A day spent in two units belongs to the unit where the patient was last that day.'
const COUNTED_ANY_PART =
  'Surveillance counts patients once a day at a fixed time; this counts any part of the day and so reads higher. Do not report it in place of that count.'
const SO_FAR = 'Today and the unfinished month are counted so far.'

/**
 * One place for numerator, denominator and exclusions of every measure; the page and the files both read it.
 * Once-a-day counting as the standard: national surveillance protocol, from memory.
 */
export const MEASURE_DEFINITIONS: Record<ReviewMeasure, MeasureDefinition> = {
  ventilator_days: {
    title: 'Ventilator days',
    unit: 'days',
    numerator:
      'Calendar days in the unit’s time zone on which a patient of the unit was on invasive ventilation for any part of the day. Two episodes on one day count once.',
    denominator: null,
    exclusions: ['Mask ventilation and high-flow oxygen.'],
    notes: [DAY_RULE, COUNTED_ANY_PART, SO_FAR],
  },
  patient_days: {
    title: 'Patient days',
    unit: 'days',
    numerator: 'Calendar days in the unit’s time zone on which a patient was in a bed of the unit for any part of the day.',
    denominator: null,
    exclusions: [],
    notes: [DAY_RULE, COUNTED_ANY_PART, SO_FAR],
  },
  utilisation: {
    title: 'Ventilator utilisation ratio',
    unit: 'ratio',
    numerator: 'Ventilator days.',
    denominator: 'Patient days.',
    exclusions: [],
    notes: ['Not computable in a month without patient days.', COUNTED_ANY_PART, SO_FAR],
  },
  screens: {
    title: 'Screens done of ventilator days eligible',
    unit: '%',
    numerator:
      'Eligible ventilator days with a complete screen (ready or not ready) on that ventilator day, at any hour and in whichever unit. Several screens on one day count once.',
    denominator: 'Ventilator days, less those excluded.',
    exclusions: [
      'Days whose first entry excused the patient (comfort care, prone, ECMO, planned procedure, other).',
      'Days on which ventilation began after the screening window had closed.',
      'Days on which the patient was under 18 or the age was not known: no screen can be recorded.',
    ],
    notes: [
      'A screen left incomplete is shown apart and does not count as done.',
      'Excused later the same day, after a complete screen: the day counts as done.',
      'Today counts once its screening window has closed; until then its ventilator days stand as not yet due.',
      DAY_RULE,
    ],
  },
  trials: {
    title: 'Breathing trials passed',
    unit: '%',
    numerator: 'Trials that ended as passed.',
    denominator: 'Trials that ended as passed or failed.',
    exclusions: ['Trials stopped for a reason that was not the patient’s doing.', 'Trials still running.'],
    notes: ['A trial belongs to the unit and the day in which it began.', SO_FAR],
  },
  extubations: {
    title: 'Extubations',
    unit: 'extubations',
    numerator:
      'Removals of an endotracheal tube: planned (comfort-focused ones included) and unplanned (by the patient, or by accident).',
    denominator: null,
    exclusions: [
      'A tracheostomy placed, and a ventilator switched off through a tracheostomy.',
      'Deaths with the tube in place.',
    ],
    notes: ['An extubation belongs to the unit and the day on which it happened.', SO_FAR],
  },
  reintubations: {
    title: 'Reintubated after planned extubation',
    unit: '%',
    numerator:
      'Planned extubations followed by intubation of the same patient within 48 h, 72 h or 7 days, in any unit of the hospital or before coming back to it. Exactly 48 h counts as within 48 h.',
    denominator: 'Planned extubations of the month whose 48 h, 72 h or 7 days are over.',
    exclusions: [
      'Extubations too recent to know, whether reintubated already or not: their number stands in the table, and the month is marked provisional.',
    ],
    notes: [
      'Attributed to the month and unit of the extubation.',
      'Comfort-focused extubations are included. A patient who died or left the hospital within the time counts as not reintubated.',
      'Unplanned extubations are counted apart, in the table.',
    ],
  },
}
