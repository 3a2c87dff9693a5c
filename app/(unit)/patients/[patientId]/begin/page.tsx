import type { Metadata } from 'next'
import { BeginPage } from '@/components/patients/begin-page'
import { readForPage } from '@/lib/server/read-for-page'
import { pageCtx } from '@/lib/server/session'
import { readPatient } from '@/lib/services/patients/read'

export const metadata: Metadata = { title: 'Begin ventilation' }

export default async function Page({ params }: PageProps<'/patients/[patientId]/begin'>) {
  const { patientId } = await params
  const ctx = await pageCtx()
  const { patient, unit, stay, episode, predictedBodyWeightKg, may, nowMs } = readForPage(() => readPatient(ctx, { patientId }))
  return <BeginPage page={{ patient, unit, stay, episode, predictedBodyWeightKg, may, nowMs }} />
}
