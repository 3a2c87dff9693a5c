import type { Metadata } from 'next'
import { EndPage } from '@/components/episodes/end-form'
import { readForPage } from '@/lib/server/read-for-page'
import { pageCtx } from '@/lib/server/session'
import { readEndForm } from '@/lib/services/episodes/read-end-form'

export const metadata: Metadata = { title: 'End of ventilation' }

export default async function Page({ params }: PageProps<'/episodes/[episodeId]/end'>) {
  const { episodeId } = await params
  const ctx = await pageCtx()
  return <EndPage initial={readForPage(() => readEndForm(ctx, { episodeId }))} />
}
