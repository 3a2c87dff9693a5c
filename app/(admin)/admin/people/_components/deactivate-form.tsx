'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useState } from 'react'
import { useForm } from 'react-hook-form'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { SubmitButton } from '@/components/forms/submit-button'
import { useSubmit } from '@/components/forms/use-submit'
import { Button } from '@/components/ui/button'
import { adminKeys } from '@/lib/client/keys/admin'
import { deactivatePersonSchema, type PersonDto } from '@/lib/schemas/people'

/** Ends an account, after asking once more. */
export function DeactivateForm({ person, onDone }: { person: PersonDto; onDone: () => void }) {
  const [isAsked, setAsked] = useState(false)
  const form = useForm({
    resolver: zodResolver(deactivatePersonSchema),
    defaultValues: { personId: person.id, version: person.version },
  })
  const submit = useSubmit({
    form,
    path: `/api/admin/people/${person.id}/deactivate`,
    invalidates: [adminKeys.root],
    onRecorded: onDone,
  })
  if (!isAsked) {
    return (
      <div className="border-t border-line pt-5">
        <Button variant="danger" onClick={() => setAsked(true)}>
          Deactivate
        </Button>
      </div>
    )
  }
  return (
    <Form submit={submit} label={`Deactivate ${person.name}`} className="flex flex-col gap-3 border-t border-line pt-5">
      <FormErrorSummary control={form.control} submit={submit} />
      <p>
        {person.name} is signed out everywhere at once and holds no role any more. What {person.name} recorded stays, with the
        name.
      </p>
      <div className="flex flex-wrap gap-3">
        <SubmitButton isSending={submit.isSending} sendingLabel="Deactivating…" variant="danger">
          Deactivate now
        </SubmitButton>
        <Button variant="quiet" onClick={() => setAsked(false)}>
          Keep active
        </Button>
      </div>
    </Form>
  )
}
