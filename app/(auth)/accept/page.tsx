import type { Metadata } from 'next'
import { Notice } from '@/components/ui/notice'
import { PageHeading } from '@/components/ui/page-heading'
import { readLink } from '@/lib/services/people/read-link'
import { InvitationForm } from './_components/invitation-form'
import { SetupForm } from './_components/setup-form'

export const metadata: Metadata = { title: 'Your account' }

export default async function AcceptPage({ searchParams }: PageProps<'/accept'>) {
  const { token } = await searchParams
  const key = typeof token === 'string' ? token : ''
  const link = readLink(key)
  if (link === null) {
    return (
      <>
        <PageHeading title="This link opens nothing" />
        <Notice tone="stop" title="Used, run out or incomplete">
          A link works once: an invitation for 7 days, the set-up link for 24 hours. Ask your administrator for a new invitation.
          For setting up Daybreath, start the server again; it prints a new link.
        </Notice>
      </>
    )
  }
  if (link.kind === 'setup') {
    return (
      <>
        <PageHeading
          title="Set up Daybreath"
          below="You become the first administrator. Administrators manage people and units; they see no patient data by that."
        />
        <SetupForm token={key} />
      </>
    )
  }
  return (
    <>
      <PageHeading
        title={`Welcome, ${link.name}`}
        below={`${link.hospitalName} has made an account for ${link.email}. Set your own password to begin.`}
      />
      <InvitationForm token={key} email={link.email} />
    </>
  )
}
