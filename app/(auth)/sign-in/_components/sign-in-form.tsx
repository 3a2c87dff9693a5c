'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useForm } from 'react-hook-form'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { PasswordField } from '@/components/forms/password-field'
import { SubmitButton } from '@/components/forms/submit-button'
import { TextField } from '@/components/forms/text-field'
import { useSubmit } from '@/components/forms/use-submit'
import { leaveFor } from '@/lib/client/leave-for'
import { signInSchema } from '@/lib/schemas/session'

/** E-mail address and password; leads on to the page that was asked for. */
export function SignInForm({ next }: { next: string }) {
  const form = useForm({ resolver: zodResolver(signInSchema), defaultValues: { email: '', password: '' } })
  const submit = useSubmit({
    form,
    path: '/api/auth/sign-in/email',
    onRecorded: () => leaveFor(next),
  })
  return (
    <Form submit={submit} label="Sign in" className="flex flex-col gap-5">
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
      <PasswordField control={form.control} name="password" label="Password" autoComplete="current-password" />
      <div>
        <SubmitButton isSending={submit.isSending} sendingLabel="Signing in…">
          Sign in
        </SubmitButton>
      </div>
    </Form>
  )
}
