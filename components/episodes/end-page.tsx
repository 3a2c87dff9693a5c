'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useRouter } from 'next/navigation'
import { useForm, useWatch } from 'react-hook-form'
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
import { todayKeys } from '@/lib/client/keys/today'
import { clockTime } from '@/lib/client/wall-clock'
import type { EndFormDto } from '@/lib/schemas/bedside-forms'
import { endEpisodeSchema } from '@/lib/schemas/episodes'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { EPISODE_ENDS, SUPPORTS_AFTER, TRIAL_OUTCOMES } from '@/lib/weaning/vocabulary'
import { DECISION_WORDS, EPISODE_END_WORDS, SUPPORT_WORDS, TRIAL_OUTCOME_WORDS } from '@/lib/weaning/words'
import { StepPage } from './step-page'
import { useObservedNow } from './use-observed-now'
import { useServerNow } from './use-server-now'

const choices = <Word extends string>(list: readonly Word[], words: Record<Word, string>) =>
  list.map((value) => ({ value, label: sentenceCase(words[value]) }))
/** Ends after which the patient breathes with other support, or none. */
const WITH_SUPPORT = ['extubated', 'self_extubated', 'accidentally_extubated', 'ventilator_off']

/** The end of invasive ventilation: extubation, planned or not, and the others. */
export function EndPage({ dto }: { dto: EndFormDto }) {
  const { patient, episode, may } = dto
  if (episode.endedAt !== null) {
    return (
      <StepPage title="End ventilation" form={dto}>
        <Notice tone="info" title="Ventilation has ended">
          It is on record since {clockTime(episode.endedAt, patient.timeZone, dto.nowMs)}.
        </Notice>
      </StepPage>
    )
  }
  if (!may.end) {
    return (
      <StepPage title="End ventilation" form={dto}>
        <Notice tone="wait" title="To read only">
          An RT, a nurse or a physician of this unit records the end of ventilation.
        </Notice>
      </StepPage>
    )
  }
  return <EndForm dto={dto} />
}

function EndForm({ dto }: { dto: EndFormDto }) {
  const { patient, episode, signed, isTrialRunning } = dto
  const router = useRouter()
  const nowMs = useServerNow(dto.nowMs)
  const form = useForm({
    resolver: zodResolver(endEpisodeSchema),
    defaultValues: {
      episodeId: episode.id,
      version: episode.version,
      observed: dto.wallClock,
      supportAfter: null,
      reason: null,
      trialEnd: null,
    },
  })
  useObservedNow(form, nowMs, patient.timeZone, true)
  const end = useWatch({ control: form.control, name: 'end' })
  const submit = useSubmit({
    form,
    path: `/api/episodes/${episode.id}/end`,
    invalidates: [todayKeys.root, patientKeys.root],
    onRecorded: () => {
      form.reset(form.getValues())
      router.push(`/patients/${patient.patientId}`)
    },
  })
  const asksTrial = end === 'extubated' && isTrialRunning
  return (
    <StepPage title="End ventilation" form={dto}>
      <UnsavedGuard isDirty={form.formState.isDirty} />
      {signed ? (
        <Notice tone="calm" title="Decision signed" className="mb-6">
          {sentenceCase(DECISION_WORDS[signed.choice])}, by {signed.byName} at{' '}
          {clockTime(signed.signedAt, patient.timeZone, nowMs)}.
        </Notice>
      ) : (
        <Notice tone="wait" title="No signed decision to extubate" className="mb-6">
          A planned extubation without one asks for a reason below.
        </Notice>
      )}
      <Form submit={submit} label="End ventilation" className="flex flex-col gap-6">
        <ChoiceField
          control={form.control}
          name="end"
          label="How it ended"
          layout="stacked"
          className="max-w-[28rem]"
          options={choices(EPISODE_ENDS, EPISODE_END_WORDS)}
          onChosen={(value) => {
            if (!WITH_SUPPORT.includes(String(value))) form.setValue('supportAfter', null)
            form.setValue('trialEnd', null)
          }}
        />
        {end !== undefined && WITH_SUPPORT.includes(end) ? (
          <ChoiceField
            control={form.control}
            name="supportAfter"
            label="Support afterwards"
            options={choices(SUPPORTS_AFTER, SUPPORT_WORDS)}
            clearLabel="not recorded"
          />
        ) : null}
        {asksTrial ? (
          <div className="flex flex-col gap-4 border-l-4 border-wait pl-4">
            <ChoiceField
              control={form.control}
              name="trialEnd.outcome"
              label="A breathing trial is running: how did it end?"
              options={choices(TRIAL_OUTCOMES, TRIAL_OUTCOME_WORDS)}
            />
            <TextareaField
              control={form.control}
              name="trialEnd.reason"
              label="Reason, when it was not passed or was cut short"
              rows={2}
            />
          </div>
        ) : null}
        <TextareaField
          control={form.control}
          name="reason"
          label={end === 'extubated' && !signed ? 'Why without a signed decision' : 'Remark (may stay empty)'}
        />
        <ObservedField control={form.control} name="observed" label="Ended at" timeZone={patient.timeZone} nowMs={nowMs} />
        <FormErrorSummary control={form.control} submit={submit} />
        <div>
          <SubmitButton isSending={submit.isSending}>Record the end of ventilation</SubmitButton>
        </div>
      </Form>
    </StepPage>
  )
}
