'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useRouter } from 'next/navigation'
import { useForm } from 'react-hook-form'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { SubmitButton } from '@/components/forms/submit-button'
import { TextField } from '@/components/forms/text-field'
import { TextareaField } from '@/components/forms/textarea-field'
import { useSubmit } from '@/components/forms/use-submit'
import { PageHeading } from '@/components/ui/page-heading'
import { OPENING_HOURS, openRecordSchema, type OpenedRecordDto } from '@/lib/schemas/openings'

/** One patient's record outside the reader's own units, for a stated reason. */
export function OpenRecordPage() {
  const router = useRouter()
  const form = useForm({
    shouldFocusError: false,
    resolver: zodResolver(openRecordSchema),
    defaultValues: { recordNumber: '', reason: '' },
  })
  const submit = useSubmit({
    form,
    path: '/api/openings',
    onRecorded: ({ patientId }: OpenedRecordDto) => router.push(`/patients/${patientId}`),
  })
  return (
    <>
      <PageHeading
        title="Open a record of another unit"
        below={`To read, for ${OPENING_HOURS} h. The reason you give and each reading stand in the audit log, and the unit’s lead is told.`}
      />
      <Form submit={submit} label="Open a record of another unit" className="flex flex-col gap-6">
        <TextField control={form.control} name="recordNumber" label="Record number" width={18} maxLength={40} />
        <TextareaField
          control={form.control}
          name="reason"
          label="Why you open it"
          rows={3}
          maxLength={500}
          hint="At least 10 characters. The unit lead reads it."
        />
        <FormErrorSummary control={form.control} submit={submit} />
        <div>
          <SubmitButton isSending={submit.isSending} sendingLabel="Opening…">
            Open the record
          </SubmitButton>
        </div>
      </Form>
    </>
  )
}
