'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useRouter } from 'next/navigation'
import { useForm, useWatch } from 'react-hook-form'
import { AmendPanel } from '@/components/episodes/amend-panel'
import { useObservedNow } from '@/components/episodes/use-observed-now'
import { CheckListField } from '@/components/forms/check-field'
import { ChoiceField } from '@/components/forms/choice-field'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { ObservedField } from '@/components/forms/observed-field'
import { SubmitButton } from '@/components/forms/submit-button'
import { TextareaField } from '@/components/forms/textarea-field'
import { UnsavedGuard } from '@/components/forms/unsaved-guard'
import { useSubmit } from '@/components/forms/use-submit'
import { Button } from '@/components/ui/button'
import { patientKeys } from '@/lib/client/keys/patients'
import { stepKeys } from '@/lib/client/keys/steps'
import { todayKeys } from '@/lib/client/keys/today'
import { wallClock } from '@/lib/client/wall-clock'
import { endHoldSchema, type HoldEndDto, type HoldFormDto, type RunningHoldDto } from '@/lib/schemas/holds'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { describeRule } from '@/lib/weaning/stop/describe-rule'
import { HOLD_OUTCOMES, type HoldOutcome } from '@/lib/weaning/vocabulary'
import { HOLD_OUTCOME_WORDS } from '@/lib/weaning/words'
import { InfusionList } from './infusion-list'
import { RestartList } from './restart-list'

type Props = {
  dto: HoldFormDto
  holdId: string
  /** The running hold that ends; null when an end already recorded is corrected. */
  hold: RunningHoldDto | null
  outcome?: HoldOutcome
  amending: HoldEndDto | null
  nowMs: number
  onBack?: () => void
}

/** The end of a hold: outcome, what ended it, and what the restart rates come to. */
export function HoldEndForm({ dto, holdId, hold, outcome, amending, nowMs, onBack }: Props) {
  const router = useRouter()
  const { episodeId, patientId, timeZone } = dto.patient
  const form = useForm({
    shouldFocusError: false,
    resolver: zodResolver(endHoldSchema),
    defaultValues: {
      episodeId,
      holdId,
      observed: amending ? wallClock(amending.observedAt, timeZone) : wallClock(nowMs, timeZone),
      amends: amending ? { id: amending.id, reason: '' } : null,
      outcome: amending?.outcome ?? outcome,
      rulesMet: amending?.rulesMet.map(({ id }) => id) ?? [],
      note: amending?.note ?? null,
    },
  })
  useObservedNow(form, nowMs, timeZone, amending === null)
  const chosen = useWatch({ control: form.control, name: 'outcome' })
  const submit = useSubmit({
    form,
    path: `/api/episodes/${episodeId}/holds/${holdId}/end`,
    onRecorded: () => {
      form.reset(form.getValues())
      router.push(`/patients/${patientId}`)
    },
    invalidates: [stepKeys.root, todayKeys.root, patientKeys.root],
  })
  const alreadyMet = hold?.rules.filter(({ state }) => state === 'met') ?? []
  const others = dto.protocol.content.hold.failRules.filter(({ id }) => !alreadyMet.some((rule) => rule.id === id))
  return (
    <section aria-labelledby="end-hold" className="border-t-2 border-ink pt-4">
      <UnsavedGuard isDirty={form.formState.isDirty} />
      <h2 id="end-hold" className="mb-3 text-lg font-bold">
        End of the hold
      </h2>
      <AmendPanel form={form} entry={amending} timeZone={timeZone} nowMs={nowMs} />
      <Form submit={submit} label="End of the hold" className="flex flex-col gap-6">
        <ChoiceField
          control={form.control}
          name="outcome"
          label="Outcome"
          options={HOLD_OUTCOMES.map((value) => ({ value, label: sentenceCase(HOLD_OUTCOME_WORDS[value]) }))}
        />
        {chosen === 'not_tolerated' ? (
          <>
            {alreadyMet.length > 0 ? <p>Met by the observations: {alreadyMet.map(({ words }) => words).join('; ')}.</p> : null}
            <CheckListField
              control={form.control}
              name="rulesMet"
              label="What else ended it"
              tone="stop"
              options={others.map((rule) => ({ value: rule.id, label: sentenceCase(describeRule(rule)) }))}
            />
            {hold ? (
              <div className="grid gap-6 desk:grid-cols-2">
                <section>
                  <h3 className="font-semibold">If sedation is restarted</h3>
                  <RestartList restarts={hold.restartsIfNotTolerated} fraction={hold.restartFraction} />
                </section>
                <InfusionList infusions={hold.infusions} isPainOnly />
              </div>
            ) : null}
          </>
        ) : null}
        <TextareaField
          control={form.control}
          name="note"
          label={chosen === 'stopped' ? 'Why it was stopped' : 'Note'}
          rows={2}
          maxLength={1000}
          hint={
            chosen === 'tolerated' && hold !== null && !hold.isTolerated
              ? 'The record does not show that it was tolerated yet: say what you saw.'
              : undefined
          }
        />
        <ObservedField control={form.control} name="observed" timeZone={timeZone} nowMs={nowMs} label="Ended at" />
        <FormErrorSummary control={form.control} submit={submit} />
        <div className="flex flex-wrap gap-3">
          <SubmitButton isSending={submit.isSending}>{amending ? 'Record correction' : 'Record the end'}</SubmitButton>
          {onBack ? (
            <Button variant="quiet" onClick={onBack}>
              Back to the running hold
            </Button>
          ) : null}
        </div>
      </Form>
    </section>
  )
}
