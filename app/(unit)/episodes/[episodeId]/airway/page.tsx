import type { Metadata } from 'next'
import { AirwayPage } from '@/components/episodes/airway-form'
import { readForPage } from '@/lib/server/read-for-page'
import { pageCtx } from '@/lib/server/session'
import { readAirwayForm } from '@/lib/services/airway/read-form'
import { oneParam } from '../_components/one-param'

export const metadata: Metadata = { title: 'Airway event' }

export default async function Page({ params, searchParams }: PageProps<'/episodes/[episodeId]/airway'>) {
  const { episodeId } = await params
  const amend = oneParam(await searchParams, 'amend')
  const ctx = await pageCtx()
  return <AirwayPage initial={readForPage(() => readAirwayForm(ctx, { episodeId, ...(amend === null ? {} : { amend }) }))} />
}
