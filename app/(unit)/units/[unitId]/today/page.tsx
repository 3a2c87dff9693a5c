import type { Metadata } from 'next'
import { cookies } from 'next/headers'
import { TodayList } from '@/components/today/today-list'
import { readForPage } from '@/lib/server/read-for-page'
import { pageCtx } from '@/lib/server/session'
import { listToday } from '@/lib/services/today/list'

export const metadata: Metadata = { title: 'Today' }

/** The unit's working page: the first paint from here, everything after by polling. */
export default async function TodayPage({ params }: { params: Promise<{ unitId: string }> }) {
  const { unitId } = await params
  const ctx = await pageCtx()
  const jar = await cookies()
  return (
    <TodayList
      first={readForPage(() => listToday(ctx, { unitId }))}
      memberships={ctx.actor.memberships}
      orderAtFirst={jar.get('daybreath-order')?.value === 'bed' ? 'bed' : 'mine'}
      areNamesHiddenAtFirst={jar.get('daybreath-names')?.value === 'hidden'}
    />
  )
}
