import type { Metadata } from 'next'
import { SettingsPage } from '@/components/settings/settings-page'
import { readForPage } from '@/lib/server/read-for-page'
import { pageCtx } from '@/lib/server/session'
import { readSettingsForm } from '@/lib/services/settings/read-form'
import { oneParam } from '../_components/one-param'

export const metadata: Metadata = { title: 'Ventilator settings' }

export default async function Page({ params, searchParams }: PageProps<'/episodes/[episodeId]/settings'>) {
  const { episodeId } = await params
  const amend = oneParam(await searchParams, 'amend')
  const ctx = await pageCtx()
  return <SettingsPage dto={readForPage(() => readSettingsForm(ctx, { episodeId, ...(amend === null ? {} : { amend }) }))} />
}
