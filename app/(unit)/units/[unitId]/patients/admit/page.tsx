import type { Metadata } from 'next'
import { AdmitPage } from '@/components/patients/admit-page'
import { readForPage } from '@/lib/server/read-for-page'
import { pageCtx } from '@/lib/server/session'
import { listPatients } from '@/lib/services/patients/list'

export const metadata: Metadata = { title: 'Admit a patient' }

export default async function Page({ params }: PageProps<'/units/[unitId]/patients/admit'>) {
  const { unitId } = await params
  const ctx = await pageCtx()
  const { patients: _patients, ...list } = readForPage(() => listPatients(ctx, { unitId }))
  return <AdmitPage list={list} />
}
