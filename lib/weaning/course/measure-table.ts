import type { ReviewMeasure } from './measure-definitions'
import type { MonthMeasures } from './monthly-measures'

/** percent and ratio hold the unrounded share; null means not computable (nothing to divide by), which is never 0. */
export type MeasureColumn = {
  key: string
  heading: string
  kind: 'count' | 'percent' | 'ratio'
  value: (month: MonthMeasures) => number | null
}

/** numerator ÷ denominator; null over zero. */
export function share(numerator: number, denominator: number): number | null {
  return denominator > 0 ? numerator / denominator : null
}

const count = (key: string, heading: string, value: (month: MonthMeasures) => number): MeasureColumn => ({
  key,
  heading,
  kind: 'count',
  value,
})
const percent = (key: string, heading: string, value: (month: MonthMeasures) => number | null): MeasureColumn => ({
  key,
  heading,
  kind: 'percent',
  value,
})

const WINDOWS = [
  { window: 'within48h', words: '48 h' },
  { window: 'within72h', words: '72 h' },
  { window: 'within7d', words: '7 days' },
] as const

const reintubationShares = WINDOWS.map(({ window, words }) =>
  percent(window, `Within ${words}`, ({ extubations: { afterPlanned } }) =>
    share(afterPlanned[window].reintubated, afterPlanned[window].known),
  ),
)
const reintubationCounts = WINDOWS.flatMap(({ window, words }) => [
  count(`${window}Reintubated`, `Reintubated within ${words}`, ({ extubations }) => extubations.afterPlanned[window].reintubated),
  count(
    `${window}Known`,
    `Of planned extubations with ${words} over`,
    ({ extubations }) => extubations.afterPlanned[window].known,
  ),
])

/** The columns of each measure, after the month: the page's table and the file are both made of them, the chart draws some. */
export const MEASURE_COLUMNS: Record<ReviewMeasure, MeasureColumn[]> = {
  ventilator_days: [count('ventilatorDays', 'Ventilator days', (month) => month.ventilatorDays)],
  patient_days: [count('patientDays', 'Patient days', (month) => month.patientDays)],
  utilisation: [
    count('ventilatorDays', 'Ventilator days', (month) => month.ventilatorDays),
    count('patientDays', 'Patient days', (month) => month.patientDays),
    { key: 'utilisation', heading: 'Ratio', kind: 'ratio', value: (month) => share(month.ventilatorDays, month.patientDays) },
  ],
  screens: [
    count('ventilatorDays', 'Ventilator days', (month) => month.ventilatorDays),
    count('excused', 'Excused', ({ screens }) => screens.excused),
    count('startedAfterWindow', 'Began after the window', ({ screens }) => screens.startedAfterWindow),
    count('notAdult', 'Under 18 or age not known', ({ screens }) => screens.notAdult),
    count('notYetDue', 'Not yet due today', ({ screens }) => screens.notYetDue),
    count('eligible', 'Eligible', ({ screens }) => screens.eligible),
    count('done', 'Screened', ({ screens }) => screens.done),
    count('incomplete', 'Left incomplete', ({ screens }) => screens.incomplete),
    count('notScreened', 'Not screened', ({ screens }) => screens.eligible - screens.done - screens.incomplete),
    percent('screened', 'Share screened', ({ screens }) => share(screens.done, screens.eligible)),
  ],
  trials: [
    count('started', 'Begun', ({ trials }) => trials.started),
    count('passed', 'Passed', ({ trials }) => trials.passed),
    count('failed', 'Failed', ({ trials }) => trials.failed),
    count('stopped', 'Stopped', ({ trials }) => trials.stopped),
    count('running', 'Still running', ({ trials }) => trials.running),
    percent('passedShare', 'Share passed', ({ trials }) => share(trials.passed, trials.passed + trials.failed)),
  ],
  extubations: [
    count('planned', 'Planned', ({ extubations }) => extubations.planned),
    count('unplanned', 'Unplanned', ({ extubations }) => extubations.unplanned),
    count('all', 'All', ({ extubations }) => extubations.planned + extubations.unplanned),
  ],
  reintubations: [
    count('planned', 'Planned extubations', ({ extubations }) => extubations.planned),
    ...reintubationShares,
    ...reintubationCounts,
    count('tooRecent', 'Too recent to know (7 days)', ({ extubations }) => extubations.afterPlanned.within7d.tooRecent),
    count(
      'tooRecentReintubated',
      'Of these reintubated already',
      ({ extubations }) => extubations.afterPlanned.within7d.tooRecentReintubated,
    ),
    count('unplanned', 'Unplanned extubations', ({ extubations }) => extubations.unplanned),
    count(
      'unplannedReintubated',
      'Of these reintubated within 7 days',
      ({ extubations: { afterUnplanned } }) => afterUnplanned.within7d.reintubated + afterUnplanned.within7d.tooRecentReintubated,
    ),
  ],
}

/** The columns that a measure's chart draws; several are drawn as parts of a whole or as lines over one axis. */
export const MEASURE_CHARTS: Record<ReviewMeasure, { columns: string[]; shape: 'bars' | 'stacked' | 'lines' }> = {
  ventilator_days: { columns: ['ventilatorDays'], shape: 'bars' },
  patient_days: { columns: ['patientDays'], shape: 'bars' },
  utilisation: { columns: ['utilisation'], shape: 'lines' },
  screens: { columns: ['screened'], shape: 'lines' },
  trials: { columns: ['passedShare'], shape: 'lines' },
  extubations: { columns: ['planned', 'unplanned'], shape: 'stacked' },
  reintubations: { columns: ['within48h', 'within7d'], shape: 'lines' },
}

/** Words on a month that is not final: unfinished, or with extubations too recent to know. Empty when it is final. */
export function monthStatus(measure: ReviewMeasure, month: MonthMeasures): string {
  if (month.isUnfinished) return 'unfinished'
  if (measure === 'reintubations' && month.extubations.afterPlanned.within7d.tooRecent > 0) return 'provisional'
  return ''
}
