'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useForm } from 'react-hook-form'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { SubmitButton } from '@/components/forms/submit-button'
import { useSubmit } from '@/components/forms/use-submit'
import { adminKeys } from '@/lib/client/keys/admin'
import { addBedsSchema } from '@/lib/schemas/units'
import { BedLabelsField } from './bed-labels-field'

/** More beds for a unit; the label of a bed out of use brings that bed back. */
export function AddBedsForm({ unitId }: { unitId: string }) {
  const form = useForm({ resolver: zodResolver(addBedsSchema), defaultValues: { unitId, bedLabels: [] } })
  const submit = useSubmit({
    form,
    path: `/api/admin/units/${unitId}/beds`,
    invalidates: [adminKeys.root],
    onRecorded: () => form.reset(),
  })
  return (
    <Form submit={submit} label="Add beds" className="flex flex-col gap-5">
      <FormErrorSummary control={form.control} submit={submit} />
      <BedLabelsField control={form.control} />
      <div>
        <SubmitButton isSending={submit.isSending} sendingLabel="Adding…">
          Add beds
        </SubmitButton>
      </div>
    </Form>
  )
}
