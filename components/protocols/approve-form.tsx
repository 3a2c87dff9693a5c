'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useRouter } from 'next/navigation'
import { useState } from 'react'
import { useForm } from 'react-hook-form'
import { DateField } from '@/components/forms/date-field'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { SubmitButton } from '@/components/forms/submit-button'
import { TextareaField } from '@/components/forms/textarea-field'
import { useSubmit } from '@/components/forms/use-submit'
import { approveProtocolSchema } from '@/lib/schemas/protocols'

type ApproveFormProps = { unitId: string; draft: { id: string; number: number; version: number }; day: string }

/** A physician puts the draft in force, now or from a later day. */
export function ApproveForm({ unitId, draft, day }: ApproveFormProps) {
  const router = useRouter()
  const [isLater, setLater] = useState(false)
  const form = useForm({
    resolver: zodResolver(approveProtocolSchema),
    defaultValues: { unitId, draftId: draft.id, version: draft.version, startDay: null, note: null },
  })
  const submit = useSubmit({ form, path: `/api/units/${unitId}/protocol/approve`, onRecorded: () => router.refresh() })
  const choose = (later: boolean) => {
    setLater(later)
    form.setValue('startDay', later ? '' : null)
    form.clearErrors('startDay')
  }
  return (
    <Form submit={submit} label={`Approve version ${draft.number}`} className="flex max-w-reading flex-col gap-5">
      <FormErrorSummary control={form.control} submit={submit} />
      <fieldset>
        <legend className="mb-1.5 font-semibold">In force</legend>
        {[false, true].map((later) => (
          <label key={String(later)} className="flex min-h-[44px] cursor-pointer items-center gap-3">
            <input
              type="radio"
              name="in-force"
              className="size-5 accent-current"
              checked={isLater === later}
              onChange={() => choose(later)}
            />
            {later ? 'from the start of a later day' : 'from the moment of approval'}
          </label>
        ))}
      </fieldset>
      {isLater ? <DateField control={form.control} name="startDay" label="First day" min={day} /> : null}
      <TextareaField control={form.control} name="note" label="Note (may stay empty)" />
      <p className="text-muted">
        By approving you put these limits in force for every patient of the unit. What was recorded before keeps its verdict.
      </p>
      <SubmitButton isSending={submit.isSending} sendingLabel="Approving…">
        Approve version {draft.number}
      </SubmitButton>
    </Form>
  )
}
