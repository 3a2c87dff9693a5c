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
import { acceptSetupSchema } from '@/lib/schemas/people'

/** The hospital and its first administrator. */
export function SetupForm({ token }: { token: string }) {
  const form = useForm({
    resolver: zodResolver(acceptSetupSchema),
    defaultValues: { kind: 'setup' as const, token, hospitalName: '', name: '', email: '', password: '' },
  })
  const submit = useSubmit({
    form,
    path: '/api/session/accept',
    onRecorded: () => leaveFor('/sign-in?done=accepted'),
  })
  return (
    <Form submit={submit} label="Set up Daybreath" className="flex flex-col gap-5">
      <FormErrorSummary control={form.control} submit={submit} />
      <TextField control={form.control} name="hospitalName" label="Hospital" maxLength={120} autoComplete="organization" />
      <TextField control={form.control} name="name" label="Your name" maxLength={120} autoComplete="name" />
      <TextField
        control={form.control}
        name="email"
        label="Your e-mail address"
        type="email"
        inputMode="email"
        autoComplete="username"
        maxLength={254}
      />
      <PasswordField
        control={form.control}
        name="password"
        label="Password"
        autoComplete="new-password"
        hint="At least 12 characters; a short sentence works well."
      />
      <div>
        <SubmitButton isSending={submit.isSending} sendingLabel="Setting up…">
          Set up
        </SubmitButton>
      </div>
    </Form>
  )
}
