import type { Metadata } from 'next'
import { ReviewPage } from '@/components/review/review-page'
import { reviewQuerySchema } from '@/lib/schemas/review'
import { readForPage } from '@/lib/server/read-for-page'
import { pageCtx } from '@/lib/server/session'
import { readReviewOrRefusal } from '@/lib/services/review/read'

export const metadata: Metadata = { title: 'Review' }

type Search = Record<string, string | string[] | undefined>

export default async function Page({
  params,
  searchParams,
}: {
  params: Promise<{ unitId: string }>
  searchParams: Promise<Search>
}) {
  const { unitId } = await params
  const search = await searchParams
  const asked = { from: one(search.from), to: one(search.to) }
  const ctx = await pageCtx()
  const parsed = reviewQuerySchema.safeParse({ unitId, from: asked.from || undefined, to: asked.to || undefined })
  if (!parsed.success) {
    const errors = Object.fromEntries(parsed.error.issues.map((issue) => [issue.path.join('.'), issue.message]))
    return <ReviewPage review={null} asked={asked} errors={errors} />
  }
  const answer = readForPage(() => readReviewOrRefusal(ctx, parsed.data))
  return answer.review ? (
    <ReviewPage review={answer.review} />
  ) : (
    <ReviewPage review={null} asked={asked} errors={answer.refused} />
  )
}

/** A parameter given once; one given twice counts as not given. */
function one(value: string | string[] | undefined): string {
  return typeof value === 'string' ? value : ''
}
