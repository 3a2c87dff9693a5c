import 'server-only'
import {
  listAirwayEventsForReview,
  listEpisodesForReview,
  listScreeningWindows,
  listScreensForReview,
  listStaysForReview,
  listTrialsForReview,
} from '@/db/queries/review'
import { authorize } from '@/lib/access/door'
import { mayInUnit } from '@/lib/access/policy'
import type { Ctx } from '@/lib/server/ctx'
import type { ReviewDto, ReviewQueryInput } from '@/lib/schemas/review'
import { AppError } from '@/lib/shared/errors'
import { localDay } from '@/lib/shared/time'
import { monthlyMeasures } from '@/lib/weaning/course/monthly-measures'
import { reviewDays } from './review-days'
import { lastDayOf, reviewMonths } from './review-months'

/** The unit's measures for each month asked for, counted from the record now. No patient is named in the answer. */
export function readReview(ctx: Ctx, input: ReviewQueryInput): ReviewDto {
  const { unit } = authorize(ctx, 'review.read', { unitId: input.unitId })
  const today = localDay(ctx.now, unit.timeZone)
  const { from, to } = reviewMonths(input, today.slice(0, 7))
  const lastDay = lastDayOf(to) < today ? lastDayOf(to) : today
  const days = reviewDays(`${from}-01`, lastDay, unit.timeZone, listScreeningWindows(ctx.db, unit.id))
  const fromMs = days[0]?.startMs ?? ctx.now
  const toMs = (days.at(-1)?.endMs ?? ctx.now) - 1
  const period = { unitId: unit.id, fromMs, toMs, firstDay: `${from}-01`, lastDay }
  const episodes = listEpisodesForReview(ctx.db, period)
  const months = monthlyMeasures({
    unitId: unit.id,
    days,
    nowMs: ctx.now,
    stays: listStaysForReview(ctx.db, period),
    episodes,
    screens: listScreensForReview(ctx.db, period),
    trials: listTrialsForReview(ctx.db, period),
    airwayEvents: listAirwayEventsForReview(ctx.db, period),
  })
  const mayExport = ctx.actor.kind === 'person' && mayInUnit(ctx.actor.memberships, 'review.export', unit.id)
  return {
    unit: { id: unit.id, name: unit.name, timeZone: unit.timeZone },
    from,
    to,
    day: today,
    countedAtMs: ctx.now,
    months,
    mayExport,
  }
}

/** The same for a page, where months that make no sense are answered with what is wrong at which field. */
export function readReviewOrRefusal(
  ctx: Ctx,
  input: ReviewQueryInput,
): { review: ReviewDto } | { review: null; refused: Record<string, string> } {
  try {
    return { review: readReview(ctx, input) }
  } catch (error) {
    if (error instanceof AppError && error.code === 'INVALID') return { review: null, refused: error.fields ?? {} }
    throw error
  }
}
