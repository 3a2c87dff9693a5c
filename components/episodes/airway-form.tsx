'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import Link from 'next/link'
import { useRouter } from 'next/navigation'
import { useForm } from 'react-hook-form'
import { ChoiceField } from '@/components/forms/choice-field'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { ObservedField } from '@/components/forms/observed-field'
import { SubmitButton } from '@/components/forms/submit-button'
import { TextareaField } from '@/components/forms/textarea-field'
import { UnsavedGuard } from '@/components/forms/unsaved-guard'
import { useSubmit } from '@/components/forms/use-submit'
import { Notice } from '@/components/ui/notice'
import { patientKeys } from '@/lib/client/keys/patients'
import { stepKeys } from '@/lib/client/keys/steps'
import { todayKeys } from '@/lib/client/keys/today'
import { wallClock } from '@/lib/client/wall-clock'
import { recordAirwaySchema } from '@/lib/schemas/airway'
import type { AirwayFormDto } from '@/lib/schemas/bedside-forms'
import { AIRWAY_EVENT_WORDS } from '@/lib/weaning/words'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { AmendPanel } from './amend-panel'
import { notAnswered } from './not-answered'
import { StepPage } from './step-page'
import { useObservedNow } from './use-observed-now'
import { useServerNow } from './use-server-now'

/** What happened to the airway while ventilation goes on. Extubation and the end of ventilation have a page of their own. */
export function AirwayPage({ initial: dto }: { initial: AirwayFormDto }) {
  const router = useRouter()
  const { amending } = dto
  const { episodeId, patientId, timeZone, airway } = dto.patient
  const nowMs = useServerNow(dto.nowMs)
  const form = useForm({
    resolver: zodResolver(recordAirwaySchema),
    defaultValues: {
      episodeId,
      observed: amending ? wallClock(amending.observedAt, timeZone) : dto.wallClock,
      amends: amending ? { id: amending.id, reason: '' } : null,
      event: amending ? ('tracheostomy_placed' as const) : notAnswered<'tracheostomy_placed'>(),
      reason: amending?.reason ?? null,
    },
  })
  useObservedNow(form, nowMs, timeZone, amending === null)
  const submit = useSubmit({
    form,
    path: `/api/episodes/${episodeId}/airway`,
    onRecorded: () => {
      form.reset(form.getValues())
      router.push(`/patients/${patientId}`)
    },
    invalidates: [todayKeys.root, patientKeys.root, stepKeys.root],
  })
  return (
    <StepPage title={amending ? 'Correct the airway event' : 'Airway event'} form={dto}>
      <UnsavedGuard isDirty={form.formState.isDirty} />
      <p className="mb-5 max-w-reading">
        Extubation, planned or not, and taking the ventilator off end ventilation: <Link href={`/episodes/${episodeId}/end`}>record the end of ventilation</Link>.
      </p>
      <AmendPanel form={form} entry={amending} timeZone={timeZone} nowMs={nowMs} />
      {airway === 'tracheostomy' && !amending ? (
        <Notice tone="info" title="A tracheostomy stands on record">If its time is wrong, correct that entry from the patient’s page.</Notice>
      ) : (
        <Form submit={submit} label="Airway event" className="flex flex-col gap-7">
          <ChoiceField control={form.control} name="event" label="What happened" options={[{ value: 'tracheostomy_placed', label: sentenceCase(AIRWAY_EVENT_WORDS.tracheostomy_placed) }]} />
          <TextareaField control={form.control} name="reason" label="Remark, if needed" rows={2} maxLength={500} />
          <ObservedField control={form.control} name="observed" timeZone={timeZone} nowMs={nowMs} />
          <FormErrorSummary control={form.control} submit={submit} />
          <div><SubmitButton isSending={submit.isSending}>{amending ? 'Record correction' : 'Record airway event'}</SubmitButton></div>
        </Form>
      )}
    </StepPage>
  )
}
