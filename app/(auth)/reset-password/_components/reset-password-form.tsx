'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import Link from 'next/link'
import { useForm } from 'react-hook-form'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { PasswordField } from '@/components/forms/password-field'
import { SubmitButton } from '@/components/forms/submit-button'
import { useSubmit } from '@/components/forms/use-submit'
import { leaveFor } from '@/lib/client/leave-for'
import { resetPasswordSchema } from '@/lib/schemas/session'

/** A new password against the token of a mailed link. */
export function ResetPasswordForm({ token }: { token: string }) {
  const form = useForm({ resolver: zodResolver(resetPasswordSchema), defaultValues: { token, newPassword: '' } })
  const submit = useSubmit({
    form,
    path: '/api/auth/reset-password',
    onRecorded: () => leaveFor('/sign-in?done=password'),
  })
  return (
    <Form submit={submit} label="Set a new password" className="flex flex-col gap-5">
      <FormErrorSummary control={form.control} submit={submit} />
      {submit.failure?.code === 'PRECONDITION' ? (
        <Link href="/forgot-password" className="inline-flex min-h-[44px] items-center underline font-semibold">
          Ask for a new link
        </Link>
      ) : null}
      <PasswordField
        control={form.control}
        name="newPassword"
        label="New password"
        autoComplete="new-password"
        hint="At least 12 characters; a short sentence works well."
      />
      <div>
        <SubmitButton isSending={submit.isSending} sendingLabel="Setting…">
          Set password
        </SubmitButton>
      </div>
    </Form>
  )
}
