import type { Metadata } from 'next'
import { PageHeading } from '@/components/ui/page-heading'
import { readForPage } from '@/lib/server/read-for-page'
import { pageCtx } from '@/lib/server/session'
import { readHospital } from '@/lib/services/hospital/read'
import { HospitalForm } from './_components/hospital-form'

export const metadata: Metadata = { title: 'Hospital' }

export default async function HospitalPage() {
  const ctx = await pageCtx()
  const hospital = readForPage(() => readHospital(ctx))
  return (
    <>
      <PageHeading title="Hospital" below="What holds for every unit." />
      <HospitalForm hospital={hospital} />
    </>
  )
}
