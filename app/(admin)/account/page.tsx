import type { Metadata } from 'next'
import { PageHeading } from '@/components/ui/page-heading'
import { pageCtx } from '@/lib/server/session'
import { readMe } from '@/lib/services/session/read-me'
import { ROLE_WORDS } from '@/lib/weaning/words'
import { ChangePasswordForm } from './_components/change-password-form'
import { SignOutEverywhere } from './_components/sign-out-everywhere'

export const metadata: Metadata = { title: 'Account' }

export default async function AccountPage() {
  const me = readMe(await pageCtx())
  return (
    <>
      <PageHeading title={me.name} below={`${me.email}, ${me.hospitalName}`} />
      <h2 className="text-xl font-bold">Roles</h2>
      <ul className="mt-2 mb-8">
        {me.memberships.map((held) => (
          <li key={`${held.unitId}-${held.role}`}>
            {held.unitName}: {ROLE_WORDS[held.role]}
          </li>
        ))}
        {me.isAdministrator ? <li>Administrator</li> : null}
        {me.memberships.length === 0 && !me.isAdministrator ? <li>None yet. An administrator gives roles.</li> : null}
      </ul>
      <h2 className="mb-3 text-xl font-bold">Change password</h2>
      <ChangePasswordForm email={me.email} />
      <h2 className="mt-10 mb-3 text-xl font-bold">Signed in elsewhere</h2>
      <SignOutEverywhere />
    </>
  )
}
