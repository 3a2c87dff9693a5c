import type { Metadata } from 'next'
import { EndPage } from '@/components/episodes/end-page'
import { readForPage } from '@/lib/server/read-for-page'
import { pageCtx } from '@/lib/server/session'
import { readEndForm } from '@/lib/services/episodes/read-end-form'

export const metadata: Metadata = { title: 'End ventilation' }

export default async function Page({ params }: PageProps<'/episodes/[episodeId]/end'>) {
  const { episodeId } = await params
  const ctx = await pageCtx()
  return <EndPage dto={readForPage(() => readEndForm(ctx, { episodeId }))} />
}
