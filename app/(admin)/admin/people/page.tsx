import type { Metadata } from 'next'
import { readForPage } from '@/lib/server/read-for-page'
import { pageCtx } from '@/lib/server/session'
import { listPeople } from '@/lib/services/people/list'
import { PeopleList } from './_components/people-list'

export const metadata: Metadata = { title: 'People' }

export default async function PeoplePage() {
  const ctx = await pageCtx()
  return <PeopleList initial={readForPage(() => listPeople(ctx))} />
}
