'use client'

import { useRouter } from 'next/navigation'
import type { ReactNode } from 'react'
import type { FieldPath, FieldValues, UseFormReturn } from 'react-hook-form'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { ObservedField } from '@/components/forms/observed-field'
import { SubmitButton } from '@/components/forms/submit-button'
import { UnsavedGuard } from '@/components/forms/unsaved-guard'
import { useSubmit } from '@/components/forms/use-submit'
import { Notice } from '@/components/ui/notice'
import { patientKeys } from '@/lib/client/keys/patients'
import { todayKeys } from '@/lib/client/keys/today'
import type { BedsideFormDto } from '@/lib/schemas/bedside-forms'
import type { EntryDto } from '@/lib/schemas/observed'
import { AmendPanel } from './amend-panel'
import { StepPage } from './step-page'
import { useObservedNow } from './use-observed-now'

type BedsideFormProps<Values extends FieldValues, Context, Output> = {
  dto: BedsideFormDto & { amending: EntryDto | null }
  form: UseFormReturn<Values, Context, Output>
  title: string
  path: string
  mayRecord: boolean
  nowMs: number
  children: ReactNode
}

/** The frame of a bedside form: whom it is about, when it was observed, what is wrong, and recording it. Goes back to the patient afterwards. */
export function BedsideForm<Values extends FieldValues, Context, Output>(props: BedsideFormProps<Values, Context, Output>) {
  const { dto, form, title, path, mayRecord, nowMs, children } = props
  const { patient, amending } = dto
  const router = useRouter()
  useObservedNow(form, nowMs, patient.timeZone, amending === null)
  const submit = useSubmit({
    form,
    path,
    invalidates: [todayKeys.root, patientKeys.root],
    onRecorded: () => {
      form.reset(form.getValues())
      router.push(`/patients/${patient.patientId}`)
    },
  })
  const refusal = refusalOf(mayRecord, patient.episodeEndedAt !== null && amending === null)
  if (refusal)
    return (
      <StepPage title={title} form={dto}>
        <Notice tone="wait" title={refusal.title}>
          {refusal.text}
        </Notice>
      </StepPage>
    )
  return (
    <StepPage title={amending ? `Correct: ${title.toLowerCase()}` : title} form={dto}>
      <UnsavedGuard isDirty={form.formState.isDirty} />
      <AmendPanel form={form} entry={amending} timeZone={patient.timeZone} nowMs={nowMs} />
      <Form submit={submit} label={title} className="flex flex-col gap-6">
        {children}
        <ObservedField control={form.control} name={'observed' as FieldPath<Values>} timeZone={patient.timeZone} nowMs={nowMs} />
        <FormErrorSummary control={form.control} submit={submit} />
        <div>
          <SubmitButton isSending={submit.isSending}>{amending ? 'Record correction' : 'Record'}</SubmitButton>
        </div>
      </Form>
    </StepPage>
  )
}

function refusalOf(mayRecord: boolean, isOver: boolean): { title: string; text: string } | null {
  if (isOver) return { title: 'Ventilation has ended', text: 'What was recorded can be corrected from the patient’s page.' }
  if (!mayRecord) return { title: 'To read only', text: 'An RT, a nurse or a physician of this unit records this.' }
  return null
}
