'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useForm } from 'react-hook-form'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { SubmitButton } from '@/components/forms/submit-button'
import { useSubmit } from '@/components/forms/use-submit'
import { adminKeys } from '@/lib/client/keys/admin'
import { reinvitePersonSchema, type PersonDto } from '@/lib/schemas/people'

/** A new link for somebody who has no password yet, or who comes back after deactivation. */
export function ReinviteForm({ person, onDone }: { person: PersonDto; onDone: () => void }) {
  const form = useForm({
    resolver: zodResolver(reinvitePersonSchema),
    defaultValues: { personId: person.id, version: person.version },
  })
  const submit = useSubmit({
    form,
    path: `/api/admin/people/${person.id}/reinvite`,
    invalidates: [adminKeys.root],
    onRecorded: onDone,
  })
  return (
    <Form submit={submit} label={`Invite ${person.name} again`} className="flex flex-col gap-3">
      <FormErrorSummary control={form.control} submit={submit} />
      <p>
        {person.state === 'deactivated'
          ? 'The person comes back with a new password and without roles; give the roles afterwards.'
          : 'A new mail replaces the earlier link.'}
      </p>
      <div>
        <SubmitButton isSending={submit.isSending} sendingLabel="Inviting…" variant="secondary">
          Invite again
        </SubmitButton>
      </div>
    </Form>
  )
}
