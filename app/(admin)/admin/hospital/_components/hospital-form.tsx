'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useRouter } from 'next/navigation'
import { useState } from 'react'
import { useForm } from 'react-hook-form'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { NumberField } from '@/components/forms/number-field'
import { SubmitButton } from '@/components/forms/submit-button'
import { TextField } from '@/components/forms/text-field'
import { UnsavedGuard } from '@/components/forms/unsaved-guard'
import { useSubmit } from '@/components/forms/use-submit'
import { updateHospitalSchema, type HospitalDto } from '@/lib/schemas/hospital'

/** Name and idle lock. */
export function HospitalForm({ hospital }: { hospital: HospitalDto }) {
  const router = useRouter()
  const [isSaved, setSaved] = useState(false)
  const { name, idleLockMin, version } = hospital
  const form = useForm({ resolver: zodResolver(updateHospitalSchema), defaultValues: { name, idleLockMin, version } })
  const submit = useSubmit({
    form,
    path: '/api/admin/hospital',
    onRecorded: (saved: HospitalDto) => {
      form.reset({ name: saved.name, idleLockMin: saved.idleLockMin, version: saved.version })
      setSaved(true)
      router.refresh()
    },
  })
  const { isDirty } = form.formState
  return (
    <Form submit={submit} label="Hospital" className="flex max-w-reading flex-col gap-5">
      <UnsavedGuard isDirty={isDirty} />
      <FormErrorSummary control={form.control} submit={submit} />
      <TextField control={form.control} name="name" label="Name" maxLength={120} width={36} />
      <NumberField
        control={form.control}
        name="idleLockMin"
        label="Screens lock after"
        unit="min without activity"
        digits={3}
        isWhole
        hint="From 1 to 240 minutes. What was typed on a locked page comes back with the password."
      />
      <div className="flex flex-wrap items-center gap-4">
        <SubmitButton isSending={submit.isSending} sendingLabel="Saving…">
          Save
        </SubmitButton>
        <p role="status" className="font-semibold text-calm">
          {isSaved && !isDirty ? 'Saved.' : ''}
        </p>
      </div>
    </Form>
  )
}
