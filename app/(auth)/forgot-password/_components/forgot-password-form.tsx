'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useState } from 'react'
import { useForm } from 'react-hook-form'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { SubmitButton } from '@/components/forms/submit-button'
import { TextField } from '@/components/forms/text-field'
import { useSubmit } from '@/components/forms/use-submit'
import { Notice } from '@/components/ui/notice'
import { requestResetSchema } from '@/lib/schemas/session'

/** Asks for a mail with a reset link. The answer does not tell whether the address has an account. */
export function ForgotPasswordForm() {
  const [isAsked, setAsked] = useState(false)
  const form = useForm({ resolver: zodResolver(requestResetSchema), defaultValues: { email: '' } })
  const submit = useSubmit({ form, path: '/api/auth/request-password-reset', onRecorded: () => setAsked(true) })
  return (
    <Form submit={submit} label="New password" className="flex flex-col gap-5">
      <FormErrorSummary control={form.control} submit={submit} />
      <TextField
        control={form.control}
        name="email"
        label="E-mail address"
        type="email"
        inputMode="email"
        autoComplete="username"
        maxLength={254}
      />
      <div>
        <SubmitButton isSending={submit.isSending} sendingLabel="Asking…">
          Send me a link
        </SubmitButton>
      </div>
      <div role="status">
        {isAsked && !submit.failure ? (
          <Notice tone="calm" title="Asked for">
            If this address has an account here, the mail is on its way. If nothing comes within a few minutes, look among
            unwanted mail or ask your administrator.
          </Notice>
        ) : null}
      </div>
    </Form>
  )
}
