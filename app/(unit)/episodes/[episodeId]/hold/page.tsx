import type { Metadata } from 'next'
import { HoldPage } from '@/components/holds/hold-page'
import { readForPage } from '@/lib/server/read-for-page'
import { pageCtx } from '@/lib/server/session'
import { readHoldForm } from '@/lib/services/holds/read-form'
import { oneParam } from '../_components/one-param'

export const metadata: Metadata = { title: 'Sedation hold' }

export default async function Page({ params, searchParams }: PageProps<'/episodes/[episodeId]/hold'>) {
  const { episodeId } = await params
  const amend = oneParam(await searchParams, 'amend')
  const ctx = await pageCtx()
  const initial = readForPage(() => readHoldForm(ctx, { episodeId, ...(amend === null ? {} : { amend }) }))
  return <HoldPage initial={initial} amend={amend} />
}
