import { z } from 'zod'
import { REVIEW_MEASURES } from '@/lib/weaning/course/measure-definitions'
import type { MonthMeasures } from '@/lib/weaning/course/monthly-measures'

const month = z
  .string()
  .regex(/^\d{4}-(0[1-9]|1[0-2])$/, 'Give the month as year-month, such as 2026-11.')
  .optional()

/** Which months of a unit are reviewed. Both may be left out: then the 24 months up to now. */
export const reviewQuerySchema = z.object({ unitId: z.string().min(1), from: month, to: month })
export type ReviewQueryInput = z.output<typeof reviewQuerySchema>

export const reviewCsvQuerySchema = reviewQuerySchema.extend({
  measure: z.enum(REVIEW_MEASURES, { error: 'There is no such measure.' }),
})
export type ReviewCsvQueryInput = z.output<typeof reviewCsvQuerySchema>

/** The review of a unit, month by month. Months are yyyy-mm in the unit's time zone. */
export type ReviewDto = {
  unit: { id: string; name: string; timeZone: string }
  from: string
  to: string
  /** The unit's calendar day of the count, and the moment. */
  day: string
  countedAtMs: number
  months: MonthMeasures[]
  mayExport: boolean
}
