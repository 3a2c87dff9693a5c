import type { Metadata } from 'next'
import { notFound } from 'next/navigation'
import { OpenRecordPage } from '@/components/patients/open-record-page'
import { requirePageActor } from '@/lib/server/session'

export const metadata: Metadata = { title: 'Open a record of another unit' }

export default async function Page() {
  const { memberships } = await requirePageActor()
  // Only clinicians open records; the administration alone gives no sight of patients.
  if (memberships.length === 0) notFound()
  return <OpenRecordPage />
}
