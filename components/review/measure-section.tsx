import { buttonClass } from '@/components/ui/button'
import { DataTable } from '@/components/ui/data-table'
import type { ReviewDto } from '@/lib/schemas/review'
import { MEASURE_DEFINITIONS, type ReviewMeasure } from '@/lib/weaning/course/measure-definitions'
import { MEASURE_COLUMNS, monthStatus } from '@/lib/weaning/course/measure-table'
import { cn } from '@/lib/shared/cn'
import { formatMonth } from '@/lib/shared/format'
import { formatValue } from './format-measure'
import { LazyMeasureChart } from './lazy-measure-chart'
import { MeasureDefinitionList } from './measure-definition-list'
import { describeChart, latestFinal, measureChartData } from './measure-series'

const DISCLOSURE =
  'min-h-target cursor-pointer py-2.5 pr-3 font-semibold underline decoration-line decoration-2 underline-offset-4 hover:decoration-ink'
/** A table of more columns than this takes the page's whole width while it is open. */
const NARROW_COLUMNS = 5

/** One measure: its latest final month, its chart, and behind one tap its table, how it is counted, and its file. */
export function MeasureSection({ measure, review }: { measure: ReviewMeasure; review: ReviewDto }) {
  const { title } = MEASURE_DEFINITIONS[measure]
  const { unit, months, from, to, mayExport } = review
  const data = measureChartData(measure, months)
  const latest = latestFinal(measure, months)
  const isWide = MEASURE_COLUMNS[measure].length > NARROW_COLUMNS
  return (
    <section
      aria-labelledby={`measure-${measure}`}
      className={cn('min-w-0 break-inside-avoid border-t border-line pt-5', isWide && 'desk:has-[[data-table][open]]:col-span-2')}
    >
      <h2 id={`measure-${measure}`} className="text-xl font-bold">
        {title}
      </h2>
      {latest ? (
        <p className="mt-1 flex flex-wrap items-baseline gap-x-5 text-muted">
          {latest.values.map(({ heading, text }) => (
            <span key={heading}>
              <span className="figure text-[28px] font-semibold text-ink">{text}</span>{' '}
              {latest.values.length > 1 ? heading.toLowerCase() : data.series[0]?.kind === 'count' ? data.axis : ''}
            </span>
          ))}
          <span>in {latest.month}</span>
        </p>
      ) : (
        <p className="mt-1 text-muted">No final month yet.</p>
      )}
      <figure className="mt-3">
        <div role="img" aria-label={`Chart of ${title} by month. ${describeChart(measure, months)}`}>
          <LazyMeasureChart data={data} />
        </div>
        <figcaption className="mt-1 text-sm text-muted">
          <ChartKey measure={measure} review={review} />
        </figcaption>
      </figure>
      <div className="mt-2 flex flex-wrap items-start gap-x-4">
        <details data-table className="min-w-0 max-w-full">
          <summary className={DISCLOSURE}>Table</summary>
          <MeasureTable measure={measure} review={review} />
        </details>
        <details className="min-w-0 max-w-full">
          <summary className={DISCLOSURE}>How it is counted</summary>
          <MeasureDefinitionList measure={measure} />
        </details>
        {mayExport ? (
          <a
            className={buttonClass('quiet', 'no-print')}
            aria-label={`CSV of ${title}`}
            href={`/api/units/${unit.id}/review/csv?measure=${measure}&from=${from}&to=${to}`}
          >
            CSV
          </a>
        ) : null}
      </div>
    </section>
  )
}

/** What the marks mean, in words, and only those that occur. */
function ChartKey({ measure, review }: { measure: ReviewMeasure; review: ReviewDto }) {
  const { shape } = measureChartData(measure, review.months)
  const mark = shape === 'lines' ? 'Hollow point' : 'Hatched with a dashed edge'
  const statuses = review.months.map((month) => ({ status: monthStatus(measure, month), month: formatMonth(month.month) }))
  const unfinished = statuses.find(({ status }) => status === 'unfinished')
  const provisional = statuses.filter(({ status }) => status === 'provisional').map(({ month }) => month)
  return (
    <>
      {shape === 'stacked' ? 'Solid: planned. Hatched on top: unplanned. ' : ''}
      {unfinished ? `${mark}: ${unfinished.month} is counted so far. ` : ''}
      {provisional.length > 0 ? `${mark}: ${provisional.join(', ')} provisional, some extubations are too recent to know. ` : ''}
    </>
  )
}

function MeasureTable({ measure, review }: { measure: ReviewMeasure; review: ReviewDto }) {
  const columns = MEASURE_COLUMNS[measure].map(({ key, heading, kind, value }) => ({
    key,
    heading,
    isNumeric: true,
    cell: (month: ReviewDto['months'][number]) => formatValue(kind, value(month)),
  }))
  const monthColumn = {
    key: 'month',
    heading: 'Month',
    cell: (month: ReviewDto['months'][number]) => {
      const status = monthStatus(measure, month)
      return (
        <span className="whitespace-nowrap">
          {formatMonth(month.month)}
          {status === '' ? '' : `, ${status}`}
        </span>
      )
    },
  }
  return (
    <DataTable
      caption={`${MEASURE_DEFINITIONS[measure].title} by month, ${review.unit.name}`}
      columns={[monthColumn, ...columns]}
      rows={review.months}
      rowKey={({ month }) => month}
      empty="The first month will stand here."
    />
  )
}
