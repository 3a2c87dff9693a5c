'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useRouter } from 'next/navigation'
import { useForm } from 'react-hook-form'
import { useServerNow } from '@/components/episodes/use-server-now'
import { ChoiceField } from '@/components/forms/choice-field'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { ObservedField } from '@/components/forms/observed-field'
import { SubmitButton } from '@/components/forms/submit-button'
import { UnsavedGuard } from '@/components/forms/unsaved-guard'
import { useSubmit } from '@/components/forms/use-submit'
import { PageHeading } from '@/components/ui/page-heading'
import { patientKeys } from '@/lib/client/keys/patients'
import { todayKeys } from '@/lib/client/keys/today'
import { wallClock } from '@/lib/client/wall-clock'
import { endStaySchema, type MoveFormDto } from '@/lib/schemas/stays'

const ENDS = [
  { value: 'left_unit', label: 'Left the unit' },
  { value: 'died', label: 'Died' },
]

/** The end of a stay in the unit. Ventilation that still runs is ended first, on its own page. */
export function LeavePage({ dto }: { dto: MoveFormDto }) {
  const { patient, stay, timeZone } = dto
  const router = useRouter()
  const nowMs = useServerNow(dto.nowMs)
  const form = useForm({
    resolver: zodResolver(endStaySchema),
    defaultValues: { patientId: patient.id, stayId: stay.id, observed: wallClock(dto.nowMs, timeZone) },
  })
  const submit = useSubmit({
    form,
    path: `/api/patients/${patient.id}/end-stay`,
    invalidates: [todayKeys.root, patientKeys.root],
    onRecorded: () => {
      form.reset(form.getValues())
      router.push(`/units/${stay.unitId}/patients`)
    },
  })
  return (
    <>
      <PageHeading
        title="End of the stay"
        above={
          <p>
            <span className="figure text-xl font-semibold text-ink">{stay.bedLabel}</span> {patient.familyName},{' '}
            {patient.givenName}
          </p>
        }
        below="The bed becomes free. What was recorded stays."
      />
      <UnsavedGuard isDirty={form.formState.isDirty} />
      <Form submit={submit} label="End of the stay" className="flex flex-col gap-6">
        <ChoiceField control={form.control} name="end" label="How the stay ended" options={ENDS} />
        <ObservedField control={form.control} name="observed" label="At" timeZone={timeZone} nowMs={nowMs} />
        <FormErrorSummary control={form.control} submit={submit} />
        <div>
          <SubmitButton isSending={submit.isSending}>Record the end of the stay</SubmitButton>
        </div>
      </Form>
    </>
  )
}
