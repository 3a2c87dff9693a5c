import type { Metadata } from 'next'
import { readForPage } from '@/lib/server/read-for-page'
import { pageCtx } from '@/lib/server/session'
import { listUnitsForAdmin } from '@/lib/services/units/list'
import { UnitList } from './_components/unit-list'

export const metadata: Metadata = { title: 'Units' }

export default async function UnitsPage() {
  const ctx = await pageCtx()
  return <UnitList initial={readForPage(() => listUnitsForAdmin(ctx))} />
}
