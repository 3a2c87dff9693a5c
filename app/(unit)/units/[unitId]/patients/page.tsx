import type { Metadata } from 'next'
import { UnitPatients } from '@/components/patients/unit-patients'
import { mayInUnit } from '@/lib/access/policy'
import { readForPage } from '@/lib/server/read-for-page'
import { pageCtx } from '@/lib/server/session'
import { listPatients } from '@/lib/services/patients/list'

export const metadata: Metadata = { title: 'Patients' }

export default async function Page({ params }: PageProps<'/units/[unitId]/patients'>) {
  const { unitId } = await params
  const ctx = await pageCtx()
  return (
    <UnitPatients
      initial={readForPage(() => listPatients(ctx, { unitId }))}
      mayBegin={mayInUnit(ctx.actor.memberships, 'episode.begin', unitId)}
    />
  )
}
