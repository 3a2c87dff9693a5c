'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useRouter } from 'next/navigation'
import { useForm, useWatch } from 'react-hook-form'
import { AmendPanel } from '@/components/episodes/amend-panel'
import { notAnswered } from '@/components/episodes/not-answered'
import { useObservedNow } from '@/components/episodes/use-observed-now'
import { CheckListField } from '@/components/forms/check-field'
import { ChoiceField } from '@/components/forms/choice-field'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { ObservedField } from '@/components/forms/observed-field'
import { SubmitButton } from '@/components/forms/submit-button'
import { TextareaField } from '@/components/forms/textarea-field'
import { TextField } from '@/components/forms/text-field'
import { UnsavedGuard } from '@/components/forms/unsaved-guard'
import { useSubmit } from '@/components/forms/use-submit'
import { Button } from '@/components/ui/button'
import { Notice } from '@/components/ui/notice'
import { patientKeys } from '@/lib/client/keys/patients'
import { stepKeys } from '@/lib/client/keys/steps'
import { todayKeys } from '@/lib/client/keys/today'
import { clockTime, wallClock } from '@/lib/client/wall-clock'
import { endTrialSchema, type RunningTrialDto, type TrialEndDto, type TrialFormDto } from '@/lib/schemas/trials'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { describeRule } from '@/lib/weaning/stop/describe-rule'
import { TRIAL_OUTCOMES, type BedsideSign, type TrialOutcome } from '@/lib/weaning/vocabulary'
import { TRIAL_OUTCOME_WORDS } from '@/lib/weaning/words'

type Props = {
  dto: TrialFormDto
  trialId: string
  /** The running trial that ends; null when an end already recorded is corrected. */
  trial: RunningTrialDto | null
  outcome?: TrialOutcome
  amending: TrialEndDto | null
  nowMs: number
  onBack?: () => void
}

/** The end of a trial: outcome, what ended it, what the patient went back to. */
export function TrialEndForm({ dto, trialId, trial, outcome, amending, nowMs, onBack }: Props) {
  const router = useRouter()
  const { episodeId, patientId, timeZone } = dto.patient
  const form = useForm({
    shouldFocusError: false,
    resolver: zodResolver(endTrialSchema),
    defaultValues: {
      episodeId,
      trialId,
      observed: amending ? wallClock(amending.observedAt, timeZone) : wallClock(nowMs, timeZone),
      amends: amending ? { id: amending.id, reason: '' } : null,
      outcome: amending?.outcome ?? outcome ?? notAnswered<TrialOutcome>(),
      rulesMet: amending?.rulesMet.map(({ id }) => id) ?? [],
      signs: [] as BedsideSign[],
      returnedTo: amending?.returnedTo ?? '',
      reason: amending?.reason ?? null,
    },
  })
  useObservedNow(form, nowMs, timeZone, amending === null)
  const chosen = useWatch({ control: form.control, name: 'outcome' })
  const submit = useSubmit({
    form,
    path: `/api/episodes/${episodeId}/trials/${trialId}/end`,
    onRecorded: () => {
      form.reset(form.getValues())
      if (amending) router.push(`/patients/${patientId}`)
    },
    invalidates: [stepKeys.root, todayKeys.root, patientKeys.root],
  })
  const alreadyMet = trial?.rules.filter(({ state }) => state === 'met') ?? []
  const others = dto.protocol.content.trial.stopRules.filter(({ id }) => !alreadyMet.some((rule) => rule.id === id))
  const { settings } = dto.prefill
  return (
    <section aria-labelledby="end-trial" className="border-t-2 border-ink pt-4">
      <UnsavedGuard isDirty={form.formState.isDirty} />
      <h2 id="end-trial" className="mb-3 text-lg font-bold">
        End of the trial
      </h2>
      <AmendPanel form={form} entry={amending} timeZone={timeZone} nowMs={nowMs} />
      <Form submit={submit} label="End of the trial" className="flex flex-col gap-6">
        <ChoiceField
          control={form.control}
          name="outcome"
          label="Outcome"
          options={TRIAL_OUTCOMES.map((value) => ({ value, label: sentenceCase(TRIAL_OUTCOME_WORDS[value]) }))}
        />
        {chosen === 'passed' ? (
          <PassNote trial={trial} nowMs={nowMs} timeZone={timeZone} met={alreadyMet.map(({ words }) => words)} />
        ) : null}
        {chosen === 'failed' ? (
          <>
            {alreadyMet.length > 0 ? <p>Met by the observations: {alreadyMet.map(({ words }) => words).join('; ')}.</p> : null}
            <CheckListField
              control={form.control}
              name="rulesMet"
              label={alreadyMet.length > 0 ? 'What else ended it' : 'What ended it'}
              tone="stop"
              options={others.map((rule) => ({ value: rule.id, label: sentenceCase(describeRule(rule)) }))}
            />
          </>
        ) : null}
        <TextareaField
          control={form.control}
          name="reason"
          label={chosen === 'stopped' ? 'Why it was stopped' : chosen === 'failed' ? 'Remark' : 'Reason, when one is needed'}
          rows={2}
          maxLength={1000}
        />
        <div className="flex flex-col gap-1">
          <TextField
            control={form.control}
            name="returnedTo"
            label={chosen === 'passed' ? 'Support meanwhile' : 'Returned to'}
            width={44}
            maxLength={200}
            hint={chosen === 'passed' ? 'Left on the trial settings, or what the patient went back to.' : undefined}
          />
          {settings ? (
            <div>
              <Button
                variant="quiet"
                className="text-sm"
                onClick={() =>
                  form.setValue('returnedTo', settingsText(settings), {
                    shouldDirty: true,
                    shouldValidate: form.formState.isSubmitted,
                  })
                }
              >
                As before: {settingsText(settings)}
              </Button>
            </div>
          ) : null}
        </div>
        <ObservedField control={form.control} name="observed" timeZone={timeZone} nowMs={nowMs} label="Ended at" />
        <FormErrorSummary control={form.control} submit={submit} />
        <div className="flex flex-wrap gap-3">
          <SubmitButton isSending={submit.isSending}>{amending ? 'Record correction' : 'Record the end'}</SubmitButton>
          {onBack ? (
            <Button variant="quiet" onClick={onBack}>
              Back to the running trial
            </Button>
          ) : null}
        </div>
      </Form>
    </section>
  )
}

function settingsText(settings: NonNullable<TrialFormDto['prefill']['settings']>): string {
  const support = settings.pressureSupportCmH2O === null ? '' : `, pressure support ${settings.pressureSupportCmH2O}`
  return `${settings.mode}${support}, PEEP ${settings.peepCmH2O}, FiO2 ${settings.fio2Fraction.toFixed(2)}`
}

/** What a pass needs a reason for: before the planned end, or against a limit that was met. */
function PassNote({
  trial,
  nowMs,
  timeZone,
  met,
}: {
  trial: RunningTrialDto | null
  nowMs: number
  timeZone: string
  met: readonly string[]
}) {
  if (!trial) return null
  const isEarly = nowMs < trial.plannedEndMs
  if (!isEarly && met.length === 0) return null
  return (
    <Notice tone="stop" title="A pass now needs a reason">
      {met.length > 0 ? <p>A stop rule was met: {met.join('; ')}.</p> : null}
      {isEarly ? <p>The planned end is {clockTime(trial.plannedEndMs, timeZone, nowMs)}.</p> : null}
    </Notice>
  )
}
