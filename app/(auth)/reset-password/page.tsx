import type { Metadata } from 'next'
import { PageHeading } from '@/components/ui/page-heading'
import { ResetPasswordForm } from './_components/reset-password-form'

export const metadata: Metadata = { title: 'Set a new password' }

export default async function ResetPasswordPage({ searchParams }: PageProps<'/reset-password'>) {
  const { token } = await searchParams
  return (
    <>
      <PageHeading title="Set a new password" below="This signs you out on every computer." />
      <ResetPasswordForm token={typeof token === 'string' ? token : ''} />
    </>
  )
}
