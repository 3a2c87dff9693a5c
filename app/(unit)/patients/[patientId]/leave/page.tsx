import type { Metadata } from 'next'
import { LeavePage } from '@/components/stays/leave-page'
import { readForPage } from '@/lib/server/read-for-page'
import { pageCtx } from '@/lib/server/session'
import { readMoveForm } from '@/lib/services/stays/read-move-form'

export const metadata: Metadata = { title: 'End of the stay' }

export default async function Page({ params }: PageProps<'/patients/[patientId]/leave'>) {
  const { patientId } = await params
  const ctx = await pageCtx()
  return <LeavePage dto={readForPage(() => readMoveForm(ctx, { patientId }))} />
}
