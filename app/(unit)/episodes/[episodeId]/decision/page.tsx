import type { Metadata } from 'next'
import { DecisionPage } from '@/components/decisions/decision-page'
import { readForPage } from '@/lib/server/read-for-page'
import { pageCtx } from '@/lib/server/session'
import { readDecisionForm } from '@/lib/services/decisions/read-form'
import { oneParam } from '../_components/one-param'

export const metadata: Metadata = { title: 'Decision' }

export default async function Page({ params, searchParams }: PageProps<'/episodes/[episodeId]/decision'>) {
  const { episodeId } = await params
  const amend = oneParam(await searchParams, 'amend')
  const ctx = await pageCtx()
  const initial = readForPage(() => readDecisionForm(ctx, { episodeId, ...(amend === null ? {} : { amend }) }))
  return <DecisionPage initial={initial} amend={amend} />
}
