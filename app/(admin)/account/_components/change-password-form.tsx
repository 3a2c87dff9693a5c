'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useState } from 'react'
import { useForm } from 'react-hook-form'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { PasswordField } from '@/components/forms/password-field'
import { SubmitButton } from '@/components/forms/submit-button'
import { useSubmit } from '@/components/forms/use-submit'
import { changePasswordSchema } from '@/lib/schemas/session'

/** A new password against the present one. */
export function ChangePasswordForm({ email }: { email: string }) {
  const [isChanged, setChanged] = useState(false)
  const form = useForm({ resolver: zodResolver(changePasswordSchema), defaultValues: { currentPassword: '', newPassword: '' } })
  const submit = useSubmit({
    form,
    path: '/api/me/password',
    onRecorded: () => {
      form.reset()
      setChanged(true)
    },
  })
  return (
    <Form submit={submit} label="Change password" className="flex flex-col gap-5">
      <FormErrorSummary control={form.control} submit={submit} />
      {/* For the browser's password store only. */}
      <input type="text" name="username" autoComplete="username" value={email} readOnly hidden />
      <PasswordField control={form.control} name="currentPassword" label="Present password" autoComplete="current-password" />
      <PasswordField
        control={form.control}
        name="newPassword"
        label="New password"
        autoComplete="new-password"
        hint="At least 12 characters; a short sentence works well. Other computers are signed out."
      />
      <div className="flex flex-wrap items-center gap-4">
        <SubmitButton isSending={submit.isSending} sendingLabel="Changing…">
          Change password
        </SubmitButton>
        <p role="status" className="font-semibold text-calm">
          {isChanged && !form.formState.isDirty ? 'Changed. Other computers are signed out.' : ''}
        </p>
      </div>
    </Form>
  )
}
