import type { Metadata } from 'next'
import { redirect } from 'next/navigation'
import { UnlockAndGo } from '@/components/session/unlock-and-go'
import { PageHeading } from '@/components/ui/page-heading'
import { nextPathSchema } from '@/lib/schemas/session'
import { findPageStanding } from '@/lib/server/session'

export const metadata: Metadata = { title: 'Locked' }

export default async function LockedPage({ searchParams }: PageProps<'/locked'>) {
  const next = nextPathSchema.parse((await searchParams).next)
  const standing = await findPageStanding()
  if (!standing) redirect(`/sign-in?next=${encodeURIComponent(next)}`)
  if (!standing.isLocked) redirect(next)
  return (
    <>
      <PageHeading title="This screen is locked" below="It locks by itself when nobody has worked at it for a while." />
      <UnlockAndGo name={standing.actor.name} next={next} />
    </>
  )
}
