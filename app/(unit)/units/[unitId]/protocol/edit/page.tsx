import type { Metadata } from 'next'
import { notFound } from 'next/navigation'
import { DraftForm } from '@/components/protocols/draft-form'
import { PageHeading } from '@/components/ui/page-heading'
import { readForPage } from '@/lib/server/read-for-page'
import { pageCtx } from '@/lib/server/session'
import { readProtocol } from '@/lib/services/protocols/read'

export const metadata: Metadata = { title: 'Draft of the protocol' }

export default async function Page({ params }: PageProps<'/units/[unitId]/protocol/edit'>) {
  const { unitId } = await params
  const ctx = await pageCtx()
  const page = readForPage(() => readProtocol(ctx, { unitId }))
  if (!page.may.draft) notFound()
  return (
    <>
      <PageHeading
        title={page.draft ? `Draft of version ${page.draft.number}` : 'Draft a new version'}
        below={`${page.unit.name}. Limits outside what a protocol may hold are refused at their field.`}
      />
      <DraftForm page={page} />
    </>
  )
}
