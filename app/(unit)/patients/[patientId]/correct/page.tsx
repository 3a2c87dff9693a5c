import type { Metadata } from 'next'
import { CorrectPatientPage } from '@/components/patients/correct-page'
import { readForPage } from '@/lib/server/read-for-page'
import { pageCtx } from '@/lib/server/session'
import { readPatient } from '@/lib/services/patients/read'

export const metadata: Metadata = { title: 'Correct who this is' }

export default async function Page({ params }: PageProps<'/patients/[patientId]/correct'>) {
  const { patientId } = await params
  const ctx = await pageCtx()
  const { patient, stay, may, today } = readForPage(() => readPatient(ctx, { patientId }))
  return <CorrectPatientPage page={{ patient, stay, may, today }} />
}
