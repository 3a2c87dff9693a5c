import type { Metadata } from 'next'
import Link from 'next/link'
import { PageHeading } from '@/components/ui/page-heading'
import { ForgotPasswordForm } from './_components/forgot-password-form'

export const metadata: Metadata = { title: 'New password' }

export default function ForgotPasswordPage() {
  return (
    <>
      <PageHeading
        title="New password"
        below="Write the e-mail address of your account. A mail with a link comes to it; the link works once, for one hour."
      />
      <ForgotPasswordForm />
      <p className="mt-8">
        <Link href="/sign-in" className="inline-flex min-h-[44px] items-center underline">
          Back to sign in
        </Link>
      </p>
    </>
  )
}
