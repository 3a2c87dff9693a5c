import type { Metadata } from 'next'
import { ScreenPage } from '@/components/screens/screen-page'
import { readForPage } from '@/lib/server/read-for-page'
import { pageCtx } from '@/lib/server/session'
import { readScreenForm } from '@/lib/services/screens/read-form'
import { oneParam } from '../_components/one-param'

export const metadata: Metadata = { title: 'Daily screen' }

export default async function Page({ params, searchParams }: PageProps<'/episodes/[episodeId]/screen'>) {
  const { episodeId } = await params
  const amend = oneParam(await searchParams, 'amend')
  const ctx = await pageCtx()
  const initial = readForPage(() => readScreenForm(ctx, { episodeId, ...(amend === null ? {} : { amend }) }))
  return <ScreenPage initial={initial} amend={amend} />
}
