import type { Metadata } from 'next'
import { MovePage } from '@/components/stays/move-page'
import { readForPage } from '@/lib/server/read-for-page'
import { pageCtx } from '@/lib/server/session'
import { readMoveForm } from '@/lib/services/stays/read-move-form'

export const metadata: Metadata = { title: 'Move to another bed' }

export default async function Page({ params }: PageProps<'/patients/[patientId]/move'>) {
  const { patientId } = await params
  const ctx = await pageCtx()
  return <MovePage dto={readForPage(() => readMoveForm(ctx, { patientId }))} />
}
