'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useRouter } from 'next/navigation'
import { useForm } from 'react-hook-form'
import { AmendPanel } from '@/components/episodes/amend-panel'
import { ObservationFields } from '@/components/episodes/observation-fields'
import { NO_OBSERVATION } from '@/components/episodes/observation-values'
import { useObservedNow } from '@/components/episodes/use-observed-now'
import { ChoiceField } from '@/components/forms/choice-field'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { ObservedField } from '@/components/forms/observed-field'
import { SubmitButton } from '@/components/forms/submit-button'
import { UnsavedGuard } from '@/components/forms/unsaved-guard'
import { useSubmit } from '@/components/forms/use-submit'
import { patientKeys } from '@/lib/client/keys/patients'
import { stepKeys } from '@/lib/client/keys/steps'
import { todayKeys } from '@/lib/client/keys/today'
import { wallClock } from '@/lib/client/wall-clock'
import { observeHoldSchema, type HoldFormDto, type HoldObservationDto } from '@/lib/schemas/holds'

const NUMBERS = ['breathsPerMin', 'spo2Percent', 'heartRatePerMin', 'systolicMmHg', 'diastolicMmHg'] as const
const EYES = [
  { value: 'yes', label: 'yes' },
  { value: 'no', label: 'no' },
]

type Props = { dto: HoldFormDto; holdId: string; amending: HoldObservationDto | null; nowMs: number }

/** One look at the patient during the hold. */
export function HoldObservationForm({ dto, holdId, amending, nowMs }: Props) {
  const router = useRouter()
  const { episodeId, patientId, timeZone } = dto.patient
  const form = useForm({
    shouldFocusError: false,
    resolver: zodResolver(observeHoldSchema),
    defaultValues: {
      episodeId,
      holdId,
      observed: amending ? wallClock(amending.observedAt, timeZone) : dto.wallClock,
      amends: amending ? { id: amending.id, reason: '' } : null,
      readings: amending?.readings ?? NO_OBSERVATION,
      opensEyesToVoice: amending?.opensEyesToVoice ?? null,
      confirmedUnlikely: amending?.unlikely ?? [],
    },
  })
  useObservedNow(form, nowMs, timeZone, amending === null)
  const submit = useSubmit({
    form,
    path: `/api/episodes/${episodeId}/holds/${holdId}/observations`,
    onRecorded: () => {
      form.reset({ ...form.formState.defaultValues, observed: wallClock(nowMs, timeZone) })
      if (amending) router.push(`/patients/${patientId}`)
    },
    invalidates: [stepKeys.root, todayKeys.root, patientKeys.root],
  })
  return (
    <section aria-labelledby="observe-hold" className="border-t-2 border-ink pt-4">
      <UnsavedGuard isDirty={form.formState.isDirty} />
      <h2 id="observe-hold" className="mb-3 text-lg font-bold">
        {amending ? 'Observation' : 'Add an observation'}
      </h2>
      <AmendPanel form={form} entry={amending} timeZone={timeZone} nowMs={nowMs} />
      <Form submit={submit} label="Observation during the hold" className="flex flex-col gap-5">
        <ChoiceField
          control={form.control}
          name="opensEyesToVoice"
          label="Opens eyes to voice"
          options={EYES}
          clearLabel="not assessed"
        />
        <ObservationFields form={form} at="readings" numbers={NUMBERS} />
        <ObservedField control={form.control} name="observed" timeZone={timeZone} nowMs={nowMs} />
        <FormErrorSummary control={form.control} submit={submit} />
        <div>
          <SubmitButton isSending={submit.isSending}>{amending ? 'Record correction' : 'Record observation'}</SubmitButton>
        </div>
      </Form>
    </section>
  )
}
