import type { Metadata } from 'next'
import Link from 'next/link'
import { Notice } from '@/components/ui/notice'
import { PageHeading } from '@/components/ui/page-heading'
import { nextPathSchema } from '@/lib/schemas/session'
import { readSignInPage } from '@/lib/services/session/read-sign-in-page'
import { SignInForm } from './_components/sign-in-form'

export const metadata: Metadata = { title: 'Sign in' }

const DONE: Record<string, string> = {
  accepted: 'Your password is set. Sign in with it.',
  password: 'Your new password is set. Sign in with it.',
  everywhere: 'You are signed out on every computer.',
}

export default async function SignInPage({ searchParams }: PageProps<'/sign-in'>) {
  const { next, done } = await searchParams
  const { isDemo, isSetUp } = readSignInPage()
  const message = typeof done === 'string' && Object.hasOwn(DONE, done) ? DONE[done] : undefined
  return (
    <>
      <PageHeading title="Sign in" />
      {isDemo ? (
        <Notice tone="info" title="Invented data" className="mb-6">
          This is a demonstration. The hospital, its staff and every patient in it are invented.
        </Notice>
      ) : null}
      {message ? (
        <Notice tone="calm" className="mb-6" role="status">
          {message}
        </Notice>
      ) : null}
      {isSetUp ? (
        <SignInForm next={nextPathSchema.parse(next)} />
      ) : (
        <Notice tone="wait" title="Not set up yet">
          Nobody can sign in before the first administrator has opened the one-time link that the server printed when it started.
        </Notice>
      )}
      {isSetUp ? (
        <p className="mt-8">
          <Link href="/forgot-password" className="inline-flex min-h-[44px] items-center underline">
            Set a new password by mail
          </Link>
        </p>
      ) : null}
      <p className="mt-2 text-muted">An account is made by your hospital’s administrator, who sends an invitation by mail.</p>
    </>
  )
}
