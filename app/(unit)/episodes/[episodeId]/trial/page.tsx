import type { Metadata } from 'next'
import { TrialPage } from '@/components/trials/trial-page'
import { readForPage } from '@/lib/server/read-for-page'
import { pageCtx } from '@/lib/server/session'
import { readTrialForm } from '@/lib/services/trials/read-form'
import { oneParam } from '../_components/one-param'

export const metadata: Metadata = { title: 'Breathing trial' }

export default async function Page({ params, searchParams }: PageProps<'/episodes/[episodeId]/trial'>) {
  const { episodeId } = await params
  const amend = oneParam(await searchParams, 'amend')
  const ctx = await pageCtx()
  const initial = readForPage(() => readTrialForm(ctx, { episodeId, ...(amend === null ? {} : { amend }) }))
  return <TrialPage initial={initial} amend={amend} />
}
