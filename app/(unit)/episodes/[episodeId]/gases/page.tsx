import type { Metadata } from 'next'
import { GasPage } from '@/components/gases/gas-page'
import { readForPage } from '@/lib/server/read-for-page'
import { pageCtx } from '@/lib/server/session'
import { readGasForm } from '@/lib/services/gases/read-form'
import { oneParam } from '../_components/one-param'

export const metadata: Metadata = { title: 'Blood gas' }

export default async function Page({ params, searchParams }: PageProps<'/episodes/[episodeId]/gases'>) {
  const { episodeId } = await params
  const amend = oneParam(await searchParams, 'amend')
  const ctx = await pageCtx()
  return <GasPage dto={readForPage(() => readGasForm(ctx, { episodeId, ...(amend === null ? {} : { amend }) }))} />
}
