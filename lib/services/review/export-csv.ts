import 'server-only'
import Papa from 'papaparse'
import { authorize } from '@/lib/access/door'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import type { ReviewCsvQueryInput, ReviewDto } from '@/lib/schemas/review'
import { MEASURE_DEFINITIONS, type ReviewMeasure } from '@/lib/weaning/course/measure-definitions'
import { MEASURE_COLUMNS, monthStatus } from '@/lib/weaning/course/measure-table'
import { readReview } from './read'

export type ReviewCsv = { fileName: string; text: string }

/** One measure of the review as a CSV file: the months, then how the measure is counted. Counts only, no patient. Each export is in the audit log. */
export function exportReviewCsv(ctx: Ctx, input: ReviewCsvQueryInput): ReviewCsv {
  const { unit } = authorize(ctx, 'review.export', { unitId: input.unitId })
  const review = readReview(ctx, input)
  const { from, to } = review
  return once(ctx, 'review.export', input, (tx) => {
    const subject = { kind: 'unit', id: unit.id }
    writeAudit(tx, ctx, { action: 'review.export', unitId: unit.id, subject, after: { measure: input.measure, from, to } })
    return { fileName: `${input.measure.replaceAll('_', '-')}-${from}-to-${to}.csv`, text: toCsv(review, input.measure) }
  })
}

function toCsv(review: ReviewDto, measure: ReviewMeasure): string {
  const columns = MEASURE_COLUMNS[measure]
  const table = [
    ['Month', 'Status', ...columns.map(({ heading, kind }) => (kind === 'percent' ? `${heading} (%)` : heading))],
    ...review.months.map((month) => [
      month.month,
      monthStatus(measure, month) || 'final',
      ...columns.map(({ kind, value }) => toCell(kind, value(month))),
    ]),
  ]
  // The mark at the beginning tells spreadsheets that the text is UTF-8.
  return `\ufeff${Papa.unparse([...table, [], ...definitionRows(review, measure)], { escapeFormulae: true })}\r\n`
}

/** An empty cell says "not computable"; it is never 0. */
function toCell(kind: 'count' | 'percent' | 'ratio', value: number | null): string {
  if (value === null) return ''
  if (kind === 'count') return String(value)
  return kind === 'percent' ? (value * 100).toFixed(2) : value.toFixed(4)
}

function definitionRows(review: ReviewDto, measure: ReviewMeasure): string[][] {
  const { title, numerator, denominator, exclusions, notes } = MEASURE_DEFINITIONS[measure]
  return [
    ['Measure', title],
    ['Unit', review.unit.name],
    ['Time zone', review.unit.timeZone],
    ['Counted at', new Date(review.countedAtMs).toISOString()],
    [denominator === null ? 'What is counted' : 'Numerator', numerator],
    ...(denominator === null ? [] : [['Denominator', denominator]]),
    ...exclusions.map((text) => ['Not counted', text]),
    ...notes.map((text) => ['Note', text]),
    ['Empty cells', 'Not computable: there is nothing to divide by.'],
  ]
}
