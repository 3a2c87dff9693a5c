import type { Metadata } from 'next'
import { MailPage } from '@/components/mail/mail-page'
import { pageCtx } from '@/lib/server/session'
import { readMail } from '@/lib/services/mail/read'
import { readForPage } from '@/lib/server/read-for-page'

export const metadata: Metadata = { title: 'Mail' }

export default async function Page({ params }: PageProps<'/units/[unitId]/mail'>) {
  const { unitId } = await params
  const ctx = await pageCtx()
  return <MailPage initial={readForPage(() => readMail(ctx, { unitId }))} />
}
