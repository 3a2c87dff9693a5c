import type { Metadata } from 'next'
import { ProtocolPage } from '@/components/protocols/protocol-page'
import { readForPage } from '@/lib/server/read-for-page'
import { pageCtx } from '@/lib/server/session'
import { readProtocol } from '@/lib/services/protocols/read'

export const metadata: Metadata = { title: 'Protocol' }

export default async function Page({ params }: PageProps<'/units/[unitId]/protocol'>) {
  const { unitId } = await params
  const ctx = await pageCtx()
  return <ProtocolPage page={readForPage(() => readProtocol(ctx, { unitId }))} />
}
