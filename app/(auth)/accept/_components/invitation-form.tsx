'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useForm } from 'react-hook-form'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { PasswordField } from '@/components/forms/password-field'
import { SubmitButton } from '@/components/forms/submit-button'
import { useSubmit } from '@/components/forms/use-submit'
import { leaveFor } from '@/lib/client/leave-for'
import { acceptInvitationSchema } from '@/lib/schemas/people'

/** The first password of an invited person. */
export function InvitationForm({ token, email }: { token: string; email: string }) {
  const form = useForm({
    resolver: zodResolver(acceptInvitationSchema),
    defaultValues: { kind: 'invitation' as const, token, password: '' },
  })
  const submit = useSubmit({
    form,
    path: '/api/session/accept',
    onRecorded: () => leaveFor('/sign-in?done=accepted'),
  })
  return (
    <Form submit={submit} label="Set your password" className="flex flex-col gap-5">
      <FormErrorSummary control={form.control} submit={submit} />
      {/* For the browser's password store only. */}
      <input type="text" name="username" autoComplete="username" value={email} readOnly hidden />
      <PasswordField
        control={form.control}
        name="password"
        label="Password"
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
