import type { ReviewMeasure } from '@/lib/weaning/course/measure-definitions'
import { MEASURE_CHARTS, MEASURE_COLUMNS, monthStatus, type MeasureColumn } from '@/lib/weaning/course/measure-table'
import type { MonthMeasures } from '@/lib/weaning/course/monthly-measures'
import { formatMonth } from '@/lib/shared/format'
import { formatValue } from './format-measure'

export type ChartPoint = { month: string; label: string; status: string; values: Record<string, number | null> }
export type ChartSeries = { key: string; heading: string; kind: MeasureColumn['kind'] }
/** What a chart draws, plain enough to hand from the server to the browser. Percent values are 0 to 100 here. */
export type MeasureChartData = { shape: 'bars' | 'stacked' | 'lines'; axis: string; series: ChartSeries[]; points: ChartPoint[] }

const AXIS: Record<ReviewMeasure, string> = {
  ventilator_days: 'days',
  patient_days: 'days',
  utilisation: 'ratio',
  screens: '%',
  trials: '%',
  extubations: 'extubations',
  reintubations: '%',
}

function drawnColumns(measure: ReviewMeasure): MeasureColumn[] {
  const { columns } = MEASURE_CHARTS[measure]
  return MEASURE_COLUMNS[measure].filter(({ key }) => columns.includes(key))
}

export function measureChartData(measure: ReviewMeasure, months: readonly MonthMeasures[]): MeasureChartData {
  const columns = drawnColumns(measure)
  return {
    shape: MEASURE_CHARTS[measure].shape,
    axis: AXIS[measure],
    series: columns.map(({ key, heading, kind }) => ({ key, heading, kind })),
    points: months.map((month) => ({
      month: month.month,
      label: formatMonth(month.month),
      status: monthStatus(measure, month),
      values: Object.fromEntries(columns.map(({ key, kind, value }) => [key, scaled(kind, value(month))])),
    })),
  }
}

function scaled(kind: MeasureColumn['kind'], value: number | null): number | null {
  return value !== null && kind === 'percent' ? value * 100 : value
}

/** The last month that is final, and the drawn values in it; null while there is none. */
export function latestFinal(measure: ReviewMeasure, months: readonly MonthMeasures[]) {
  const month = months.findLast((one) => monthStatus(measure, one) === '')
  if (!month) return null
  return {
    month: formatMonth(month.month),
    values: drawnColumns(measure).map(({ heading, kind, value }) => ({ heading, text: formatValue(kind, value(month)) })),
  }
}

/** The chart in sentences: for each series where it begins, where it ends, its lowest and highest month. */
export function describeChart(measure: ReviewMeasure, months: readonly MonthMeasures[]): string {
  const finals = months.filter((month) => monthStatus(measure, month) === '')
  return drawnColumns(measure)
    .map((column) => describeSeries(column, finals))
    .join(' ')
}

function describeSeries({ heading, kind, value }: MeasureColumn, months: readonly MonthMeasures[]): string {
  const known = months.flatMap((month) => {
    const found = value(month)
    return found === null ? [] : [{ label: formatMonth(month.month), value: found }]
  })
  const first = known[0]
  const last = known.at(-1)
  if (!first || !last) return `${heading}: no final month to show.`
  const lowest = known.reduce((least, one) => (one.value < least.value ? one : least))
  const highest = known.reduce((most, one) => (one.value > most.value ? one : most))
  const say = (one: { label: string; value: number }) => `${formatValue(kind, one.value)} in ${one.label}`
  const missing = months.length - known.length
  const gaps = missing > 0 ? ` Not computable in ${missing} ${missing === 1 ? 'month' : 'months'}.` : ''
  if (known.length === 1) return `${heading}: ${say(first)}.${gaps}`
  return `${heading}: ${say(first)}, ${say(last)}; lowest ${say(lowest)}, highest ${say(highest)}.${gaps}`
}
