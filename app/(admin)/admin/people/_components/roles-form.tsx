'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useForm } from 'react-hook-form'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { SubmitButton } from '@/components/forms/submit-button'
import { useSubmit } from '@/components/forms/use-submit'
import { adminKeys } from '@/lib/client/keys/admin'
import { setRolesSchema, type PeopleDto, type PersonDto } from '@/lib/schemas/people'
import { RightsFields } from './rights-fields'

/** Roles of somebody who has an account already. */
export function RolesForm({ person, units, onDone }: { person: PersonDto; units: PeopleDto['units']; onDone: () => void }) {
  const form = useForm({
    resolver: zodResolver(setRolesSchema),
    defaultValues: {
      personId: person.id,
      version: person.version,
      isAdministrator: person.isAdministrator,
      memberships: person.memberships.map(({ unitId, role }) => ({ unitId, role })),
    },
  })
  const submit = useSubmit({
    form,
    path: `/api/admin/people/${person.id}/roles`,
    invalidates: [adminKeys.root],
    onRecorded: onDone,
  })
  return (
    <Form submit={submit} label={`Roles of ${person.name}`} className="flex flex-col gap-5">
      <FormErrorSummary control={form.control} submit={submit} />
      <RightsFields control={form.control} units={units} />
      <div>
        <SubmitButton isSending={submit.isSending} sendingLabel="Saving…">
          Save roles
        </SubmitButton>
      </div>
    </Form>
  )
}
