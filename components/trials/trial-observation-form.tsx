'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useRouter } from 'next/navigation'
import { useForm } from 'react-hook-form'
import { AmendPanel } from '@/components/episodes/amend-panel'
import { ObservationFields } from '@/components/episodes/observation-fields'
import { NO_OBSERVATION, OBSERVED_NUMBERS } from '@/components/episodes/observation-values'
import { useObservedNow } from '@/components/episodes/use-observed-now'
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
import { observeTrialSchema, type TrialFormDto, type TrialObservationDto } from '@/lib/schemas/trials'

type Props = { dto: TrialFormDto; trialId: string; amending: TrialObservationDto | null; nowMs: number }

/** One look at the patient during the trial, checked at once against the stop rules when it is recorded. */
export function TrialObservationForm({ dto, trialId, amending, nowMs }: Props) {
  const router = useRouter()
  const { episodeId, patientId, timeZone } = dto.patient
  const form = useForm({
    shouldFocusError: false,
    resolver: zodResolver(observeTrialSchema),
    defaultValues: {
      episodeId,
      trialId,
      observed: amending ? wallClock(amending.observedAt, timeZone) : wallClock(nowMs, timeZone),
      amends: amending ? { id: amending.id, reason: '' } : null,
      readings: amending?.readings ?? NO_OBSERVATION,
      confirmedUnlikely: amending?.unlikely ?? [],
    },
  })
  useObservedNow(form, nowMs, timeZone, amending === null)
  const submit = useSubmit({
    form,
    path: `/api/episodes/${episodeId}/trials/${trialId}/observations`,
    onRecorded: () => {
      form.reset({ ...form.formState.defaultValues, observed: wallClock(nowMs, timeZone) })
      if (amending) router.push(`/patients/${patientId}`)
    },
    invalidates: [stepKeys.root, todayKeys.root, patientKeys.root],
  })
  return (
    <section aria-labelledby="observe-trial" className="border-t-2 border-ink pt-4">
      <UnsavedGuard isDirty={form.formState.isDirty} />
      <h2 id="observe-trial" className="mb-3 text-lg font-bold">
        {amending ? 'Observation' : 'Add an observation'}
      </h2>
      <AmendPanel form={form} entry={amending} timeZone={timeZone} nowMs={nowMs} />
      <Form submit={submit} label="Observation during the trial" className="flex flex-col gap-5">
        <ObservationFields
          form={form}
          at="readings"
          numbers={OBSERVED_NUMBERS}
          hasGas
          hasRass={false}
          signsLabel="Signs of distress"
        />
        <ObservedField control={form.control} name="observed" timeZone={timeZone} nowMs={nowMs} />
        <FormErrorSummary control={form.control} submit={submit} />
        <div>
          <SubmitButton isSending={submit.isSending}>{amending ? 'Record correction' : 'Record observation'}</SubmitButton>
        </div>
      </Form>
    </section>
  )
}
