import { render, screen, within } from '@testing-library/react'
import { describe, expect, it } from 'vitest'
import { MeasureSection } from '@/components/review/measure-section'
import { describeChart, latestFinal, measureChartData } from '@/components/review/measure-series'
import { ReviewPage } from '@/components/review/review-page'
import type { ReviewDto } from '@/lib/schemas/review'
import type { MonthMeasures } from '@/lib/weaning/course/monthly-measures'

const noWindow = { known: 0, reintubated: 0, tooRecent: 0, tooRecentReintubated: 0 }
const noReintubations = { within48h: noWindow, within72h: noWindow, within7d: noWindow }
const month = (name: string, over: Partial<MonthMeasures> = {}): MonthMeasures => ({
  month: name,
  isUnfinished: false,
  ventilatorDays: 0,
  patientDays: 0,
  screens: { eligible: 0, done: 0, incomplete: 0, excused: 0, startedAfterWindow: 0, notAdult: 0, notYetDue: 0 },
  trials: { started: 0, passed: 0, failed: 0, stopped: 0, running: 0 },
  extubations: { planned: 0, unplanned: 0, afterPlanned: noReintubations, afterUnplanned: noReintubations },
  ...over,
})
const screened = (eligible: number, done: number): MonthMeasures['screens'] => ({
  eligible,
  done,
  incomplete: 0,
  excused: 0,
  startedAfterWindow: 0,
  notAdult: 0,
  notYetDue: 0,
})
const MONTHS = [
  month('2026-09', { ventilatorDays: 40, patientDays: 80, screens: screened(30, 27) }),
  month('2026-10'),
  month('2026-11', { ventilatorDays: 60, patientDays: 80, screens: screened(50, 49) }),
  month('2026-12', { isUnfinished: true, ventilatorDays: 4, patientDays: 5, screens: screened(2, 0) }),
]
const review = (over: Partial<ReviewDto> = {}): ReviewDto => ({
  unit: { id: 'u1', name: 'Medical ICU', timeZone: 'America/Denver' },
  from: '2026-09',
  to: '2026-12',
  day: '2026-12-01',
  countedAtMs: 0,
  months: MONTHS,
  mayExport: true,
  ...over,
})

describe('a measure of the review', () => {
  it('tells its chart in words: first, last, lowest and highest final month, and the gaps', () => {
    render(<MeasureSection measure="screens" review={review()} />)
    expect(screen.getByRole('img').getAttribute('aria-label')).toBe(
      'Chart of Screens done of ventilator days eligible by month. Share screened: 90.0 % in Sep 2026, 98.0 % in Nov 2026; lowest 90.0 % in Sep 2026, highest 98.0 % in Nov 2026. Not computable in 1 month.',
    )
  })
  it('has every month in its table, says “not computable” rather than 0 %, and marks the unfinished month', () => {
    render(<MeasureSection measure="screens" review={review()} />)
    const rows = within(screen.getByRole('table', { hidden: true })).getAllByRole('row', { hidden: true })
    expect(rows).toHaveLength(5)
    expect(rows[2]?.textContent).toMatch(/Oct 2026.*not computable/)
    expect(rows[4]?.textContent).toMatch(/Dec 2026, unfinished.*0\.0 %/)
  })
  it('shows the last final month large, not the unfinished one', () => {
    expect(latestFinal('ventilator_days', MONTHS)).toEqual({
      month: 'Nov 2026',
      values: [{ heading: 'Ventilator days', text: '60' }],
    })
  })
  it('offers the file only to those who may export', () => {
    const { rerender } = render(<MeasureSection measure="trials" review={review()} />)
    expect(screen.getByRole('link', { name: 'CSV of Breathing trials passed' }).getAttribute('href')).toBe(
      '/api/units/u1/review/csv?measure=trials&from=2026-09&to=2026-12',
    )
    rerender(<MeasureSection measure="trials" review={review({ mayExport: false })} />)
    expect(screen.queryByRole('link')).toBeNull()
  })
  it('says how it is counted', () => {
    render(<MeasureSection measure="utilisation" review={review()} />)
    expect(screen.getByText('Denominator')).toBeTruthy()
    expect(screen.getByText('Patient days.')).toBeTruthy()
  })
  it('draws gaps, never zeros, for what cannot be computed', () => {
    expect(measureChartData('screens', MONTHS).points.map(({ values }) => values.screened)).toEqual([90, null, 98, 0])
  })
  it('says when there is no final month to describe', () => {
    expect(describeChart('ventilator_days', MONTHS.slice(3))).toBe('Ventilator days: no final month to show.')
  })
})

describe('the review page', () => {
  it('shows what is wrong at the month, keeps what was asked and counts nothing', () => {
    render(
      <ReviewPage
        review={null}
        asked={{ from: '2027-03', to: '2026-02' }}
        errors={{ from: 'The first month is after the last one.' }}
      />,
    )
    const field = screen.getByLabelText('First month')
    expect((field as HTMLInputElement).value).toBe('2027-03')
    expect(document.getElementById(field.getAttribute('aria-describedby') ?? '')?.textContent).toBe(
      'The first month is after the last one.',
    )
    expect(screen.queryByRole('table', { hidden: true })).toBeNull()
  })
  it('says what will stand there when no patient was in the unit', () => {
    render(<ReviewPage review={review({ months: [month('2026-12', { isUnfinished: true })] })} />)
    expect(screen.getByText(/No patient was in the unit/)).toBeTruthy()
  })
})
