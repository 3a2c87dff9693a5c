import type { Metadata } from 'next'
import { PatientPage } from '@/components/patients/patient-page'
import { readForPage } from '@/lib/server/read-for-page'
import { pageCtx } from '@/lib/server/session'
import { readPatient } from '@/lib/services/patients/read'

// The title names nobody: it stands in the history of a shared browser.
export const metadata: Metadata = { title: 'Patient' }

export default async function Page({ params }: PageProps<'/patients/[patientId]'>) {
  const { patientId } = await params
  const ctx = await pageCtx()
  return <PatientPage initial={readForPage(() => readPatient(ctx, { patientId }))} />
}
