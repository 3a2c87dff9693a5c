import type { Metadata } from 'next'
import { OpeningsPage } from '@/components/openings/openings-page'
import { readForPage } from '@/lib/server/read-for-page'
import { pageCtx } from '@/lib/server/session'
import { listOpenings } from '@/lib/services/openings/list'

export const metadata: Metadata = { title: 'Opened from outside' }

export default async function Page({ params }: PageProps<'/units/[unitId]/openings'>) {
  const { unitId } = await params
  const ctx = await pageCtx()
  return <OpeningsPage list={readForPage(() => listOpenings(ctx, { unitId }))} />
}
