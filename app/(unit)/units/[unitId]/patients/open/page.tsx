import type { Metadata } from 'next'
import { OpenRecordPage } from '@/components/patients/open-record-page'
import { requirePageActor } from '@/lib/server/session'

export const metadata: Metadata = { title: 'Open a record of another unit' }

export default async function Page() {
  await requirePageActor()
  return <OpenRecordPage />
}
