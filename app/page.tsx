import { redirect } from 'next/navigation'
import { cookies } from 'next/headers'
import { pageCtx } from '@/lib/server/session'

/** Leads to the page that the reader works on: Today of their unit, or the administration. */
export default async function FirstPage() {
  const { actor } = await pageCtx()
  const remembered = (await cookies()).get('daybreath-unit')?.value
  const unitIds = actor.memberships.map((held) => held.unitId)
  const unitId = unitIds.find((id) => id === remembered) ?? unitIds[0]
  if (unitId !== undefined) redirect(`/units/${unitId}/today`)
  redirect(actor.isAdministrator ? '/admin/people' : '/account')
}
