import { Notice } from '@/components/ui/notice'
import { PageHeading } from '@/components/ui/page-heading'
import type { ReviewDto } from '@/lib/schemas/review'
import { formatMonth } from '@/lib/shared/format'
import { REVIEW_MEASURES } from '@/lib/weaning/course/measure-definitions'
import { MeasureSection } from './measure-section'
import { MonthRangeForm } from './month-range-form'

type ReviewPageProps =
  | { review: ReviewDto }
  | { review: null; asked: { from: string; to: string }; errors: { from?: string | undefined; to?: string | undefined } }

/** What the unit's days on the ventilator are made of, month by month; or what is wrong with the months asked for. */
export function ReviewPage(props: ReviewPageProps) {
  if (props.review === null) {
    return (
      <>
        <PageHeading title="Review" />
        <Notice tone="stop" title="Nothing was counted" role="alert" className="mb-6">
          Please look at the marked month.
        </Notice>
        <MonthRangeForm {...props.asked} errors={props.errors} />
      </>
    )
  }
  const { review } = props
  const { unit, from, to, months } = review
  const isEmpty = months.every(({ patientDays }) => patientDays === 0)
  return (
    <>
      <PageHeading
        title="Review"
        below={`${unit.name}, ${formatMonth(from)} to ${formatMonth(to)}. Counted from the record just now, by the days of the unit’s time zone.`}
        aside={<MonthRangeForm from={from} to={to} errors={{}} />}
      />
      {isEmpty ? (
        <Notice tone="info" className="mb-8">
          No patient was in the unit in these months. The counts begin with the first patient admitted.
        </Notice>
      ) : null}
      <div className="grid grid-cols-[minmax(0,1fr)] gap-x-12 gap-y-10 desk:grid-cols-[repeat(2,minmax(0,1fr))]">
        {REVIEW_MEASURES.map((measure) => (
          <MeasureSection key={measure} measure={measure} review={review} />
        ))}
      </div>
    </>
  )
}
