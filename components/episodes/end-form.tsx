'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useRouter } from 'next/navigation'
import { useForm, useWatch } from 'react-hook-form'
import type { z } from 'zod'
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
import { clockTime } from '@/lib/client/wall-clock'
import type { EndFormDto } from '@/lib/schemas/bedside-forms'
import { endEpisodeSchema, isExtubation } from '@/lib/schemas/episodes'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { EPISODE_ENDS, SUPPORTS_AFTER, TRIAL_OUTCOMES, type EpisodeEnd, type TrialOutcome } from '@/lib/weaning/vocabulary'
import { DECISION_WORDS, EPISODE_END_WORDS, SUPPORT_WORDS, TRIAL_OUTCOME_WORDS } from '@/lib/weaning/words'
import { notAnswered } from './not-answered'
import { StepPage } from './step-page'
import { useObservedNow } from './use-observed-now'
import { useServerNow } from './use-server-now'

type EndInput = z.input<typeof endEpisodeSchema>

const parse = zodResolver(endEpisodeSchema)
const WITH_SUPPORT: readonly EpisodeEnd[] = ['extubated', 'self_extubated', 'accidentally_extubated', 'ventilator_off']

/** How an end reads here: it ends ventilation, so the tracheostomy stays where it is. */
function endLabel(end: EpisodeEnd): string {
  return end === 'ventilator_off' ? 'Off the ventilator, tracheostomy stays' : sentenceCase(EPISODE_END_WORDS[end])
}

/** The end of ventilation: how, when, with what support afterwards, and the outcome of a trial that still runs. */
export function EndPage({ initial: dto }: { initial: EndFormDto }) {
  const router = useRouter()
  const { episodeId, patientId, timeZone, airway } = dto.patient
  const nowMs = useServerNow(dto.nowMs)
  // What belongs to another kind of end is left out of what is checked and sent.
  const resolver: typeof parse = async (values, context, options) =>
    parse({
      ...values,
      supportAfter: WITH_SUPPORT.includes(values.end) ? values.supportAfter : null,
      trialEnd: dto.isTrialRunning && values.end === 'extubated' ? values.trialEnd : null,
    }, context, options)
  const values: EndInput = {
    episodeId, version: dto.episode.version, observed: dto.wallClock, end: notAnswered<EpisodeEnd>(), supportAfter: null, reason: null,
    trialEnd: dto.isTrialRunning ? { outcome: notAnswered<TrialOutcome>(), reason: null } : null,
  }
  const form = useForm({ resolver, defaultValues: values })
  useObservedNow(form, nowMs, timeZone, true)
  const end = useWatch({ control: form.control, name: 'end' })
  const submit = useSubmit({
    form,
    path: `/api/episodes/${episodeId}/end`,
    onRecorded: () => {
      form.reset(form.getValues())
      router.push(`/patients/${patientId}`)
    },
    invalidates: [todayKeys.root, patientKeys.root, stepKeys.root],
  })
  const ends = EPISODE_ENDS.filter((each) => (airway === 'tracheostomy' ? each !== 'extubated' && each !== 'self_extubated' : each !== 'ventilator_off'))
  if (dto.episode.endedAt !== null) {
    return (
      <StepPage title="End of ventilation" form={dto}>
        <Notice tone="info" title="Ventilation has ended">
          {clockTime(dto.episode.endedAt, timeZone, nowMs)}{dto.episode.end ? `, ${EPISODE_END_WORDS[dto.episode.end]}` : ''}.
        </Notice>
      </StepPage>
    )
  }
  return (
    <StepPage title="End of ventilation" form={dto}>
      <UnsavedGuard isDirty={form.formState.isDirty} />
      <Signed dto={dto} nowMs={nowMs} />
      <Form submit={submit} label="End of ventilation" className="flex flex-col gap-7">
        <ChoiceField control={form.control} name="end" label="How ventilation ended" layout="stacked" className="max-w-reading" options={ends.map((value) => ({ value, label: endLabel(value) }))} />
        {end && WITH_SUPPORT.includes(end) ? (
          <ChoiceField control={form.control} name="supportAfter" label="Support afterwards" clearLabel={end === 'extubated' ? undefined : 'not stated'} options={SUPPORTS_AFTER.map((value) => ({ value, label: sentenceCase(SUPPORT_WORDS[value]) }))} />
        ) : null}
        {end === 'extubated' && dto.isTrialRunning ? (
          <fieldset className="flex flex-col gap-4">
            <legend className="mb-2 text-lg font-bold">A breathing trial is still running</legend>
            <ChoiceField control={form.control} name="trialEnd.outcome" label="How it ended" options={TRIAL_OUTCOMES.map((value) => ({ value, label: sentenceCase(TRIAL_OUTCOME_WORDS[value]) }))} />
            <TextareaField control={form.control} name="trialEnd.reason" label="Reason, when one is needed" rows={2} maxLength={500} />
          </fieldset>
        ) : null}
        <TextareaField
          control={form.control}
          name="reason"
          label={end === 'extubated' && dto.signed === null ? 'Why the patient is extubated without a signed decision' : isExtubation(end) && end !== 'extubated' ? 'What happened' : 'Remark, if needed'}
          rows={2}
          maxLength={500}
        />
        <ObservedField control={form.control} name="observed" timeZone={timeZone} nowMs={nowMs} label="Ended at" />
        <FormErrorSummary control={form.control} submit={submit} />
        <div><SubmitButton isSending={submit.isSending}>Record the end of ventilation</SubmitButton></div>
      </Form>
    </StepPage>
  )
}

function Signed({ dto, nowMs }: { dto: EndFormDto; nowMs: number }) {
  if (dto.signed === null) {
    return <Notice tone="wait" title="No signed decision" className="mb-6">No decision to extubate is signed for today. A planned extubation then needs a reason.</Notice>
  }
  return (
    <Notice tone="calm" title={`Signed: ${DECISION_WORDS[dto.signed.choice]}`} className="mb-6">
      {clockTime(dto.signed.signedAt, dto.patient.timeZone, nowMs)} by {dto.signed.byName}.
    </Notice>
  )
}
