import type { Metadata } from 'next'
import { AirwayPage } from '@/components/airway/airway-page'
import { readForPage } from '@/lib/server/read-for-page'
import { pageCtx } from '@/lib/server/session'
import { readAirwayForm } from '@/lib/services/airway/read-form'
import { oneParam } from '../_components/one-param'

export const metadata: Metadata = { title: 'Airway event' }

export default async function Page({ params, searchParams }: PageProps<'/episodes/[episodeId]/airway'>) {
  const { episodeId } = await params
  const amend = oneParam(await searchParams, 'amend')
  const ctx = await pageCtx()
  return <AirwayPage dto={readForPage(() => readAirwayForm(ctx, { episodeId, ...(amend === null ? {} : { amend }) }))} />
}
