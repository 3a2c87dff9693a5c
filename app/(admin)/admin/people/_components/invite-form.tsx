'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useForm } from 'react-hook-form'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { SubmitButton } from '@/components/forms/submit-button'
import { TextField } from '@/components/forms/text-field'
import { useSubmit } from '@/components/forms/use-submit'
import { adminKeys } from '@/lib/client/keys/admin'
import { invitePersonSchema, type PeopleDto, type PersonDto } from '@/lib/schemas/people'
import { RightsFields } from './rights-fields'

/** A new account: name, address, roles. The person sets the password on the mailed link. */
export function InviteForm({ units, onInvited }: { units: PeopleDto['units']; onInvited: (person: PersonDto) => void }) {
  const form = useForm({
    resolver: zodResolver(invitePersonSchema),
    defaultValues: { name: '', email: '', isAdministrator: false, memberships: [] },
  })
  const submit = useSubmit({ form, path: '/api/admin/people', invalidates: [adminKeys.root], onRecorded: onInvited })
  return (
    <Form submit={submit} label="Invite a person" className="flex flex-col gap-5">
      <FormErrorSummary control={form.control} submit={submit} />
      <TextField control={form.control} name="name" label="Name" maxLength={120} />
      <TextField control={form.control} name="email" label="E-mail address" type="email" inputMode="email" maxLength={254} />
      <RightsFields control={form.control} units={units} />
      <div>
        <SubmitButton isSending={submit.isSending} sendingLabel="Inviting…">
          Send invitation
        </SubmitButton>
      </div>
    </Form>
  )
}
