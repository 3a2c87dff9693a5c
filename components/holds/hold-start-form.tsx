'use client'

import { useRouter } from 'next/navigation'
import { useRef } from 'react'
import { useWatch, type FieldPath } from 'react-hook-form'
import { AmendPanel } from '@/components/episodes/amend-panel'
import { ConflictDialog } from '@/components/episodes/conflict-dialog'
import { useObservedNow } from '@/components/episodes/use-observed-now'
import { ChoiceField } from '@/components/forms/choice-field'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { ObservedField } from '@/components/forms/observed-field'
import { SubmitButton } from '@/components/forms/submit-button'
import { TextareaField } from '@/components/forms/textarea-field'
import { UnsavedGuard } from '@/components/forms/unsaved-guard'
import { useSubmit } from '@/components/forms/use-submit'
import { YesNoField } from '@/components/forms/yes-no-field'
import { Button } from '@/components/ui/button'
import { patientKeys } from '@/lib/client/keys/patients'
import { stepKeys } from '@/lib/client/keys/steps'
import { todayKeys } from '@/lib/client/keys/today'
import { clockTime } from '@/lib/client/wall-clock'
import type { HoldFormDto } from '@/lib/schemas/holds'
import { judgeSafety } from '@/lib/weaning/hold/judge-safety'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { HOLD_SAFETY_WORDS } from '@/lib/weaning/words'
import { InfusionFields } from './infusion-fields'
import { withoutRate } from './infusion-input'
import { SafetyVerdict } from './safety-verdict'
import { useHoldStart, type HoldStartInput } from './use-hold-start'

const SEDATION = [
  { value: 'started', label: 'Continuous sedation is running' },
  { value: 'not_needed', label: 'No continuous sedation: hold not needed' },
]

/** The nurse's step: whether a hold is needed, the safety screen, the infusions, and the start. */
export function HoldStartForm({ dto, nowMs }: { dto: HoldFormDto; nowMs: number }) {
  const router = useRouter()
  const frame = useRef<HTMLDivElement>(null)
  const form = useHoldStart(dto)
  const { patientId, episodeId, timeZone } = dto.patient
  const isAmending = dto.amending?.kind === 'start'
  useObservedNow(form, nowMs, timeZone, !isAmending)
  const [sedation, answers] = useWatch({ control: form.control, name: ['start', 'safety'] })
  const items = dto.protocol.content.hold.safetyItems
  const verdict = judgeSafety(items, answers ?? {})
  const isRunning = sedation === 'started'
  const submit = useSubmit({
    form,
    path: `/api/episodes/${episodeId}/holds`,
    onRecorded: () => {
      const stays = isRunning && verdict.result === 'safe' && !isAmending
      form.reset(form.getValues())
      if (!stays) router.push(`/patients/${patientId}`)
    },
    invalidates: [todayKeys.root, patientKeys.root, stepKeys.root],
  })

  return (
    <div ref={frame}>
      <UnsavedGuard isDirty={form.formState.isDirty} />
      <AmendPanel
        form={form}
        entry={dto.amending?.kind === 'start' ? dto.amending.hold : null}
        timeZone={timeZone}
        nowMs={nowMs}
      />
      <Form submit={submit} label="Sedation hold" className="flex flex-col gap-8">
        <ChoiceField
          control={form.control}
          name="start"
          label="Sedation"
          layout="stacked"
          options={SEDATION}
          className="max-w-reading"
        />
        {isRunning ? (
          <>
            <fieldset className="flex flex-col">
              <legend className="mb-1 text-lg font-bold">Safety screen: is any of these present?</legend>
              {items.map((item) => (
                <div key={item} className="border-t border-line py-3">
                  <YesNoField
                    control={form.control}
                    name={`safety.${item}` as FieldPath<HoldStartInput>}
                    label={sentenceCase(HOLD_SAFETY_WORDS[item])}
                  />
                </div>
              ))}
              <SafetyVerdict verdict={verdict} />
            </fieldset>
            <div className="flex flex-col gap-3">
              <InfusionFields form={form} />
              {dto.lastInfusions ? (
                <div>
                  <Button
                    variant="quiet"
                    onClick={() =>
                      form.setValue('infusions', dto.lastInfusions?.infusions.map(withoutRate) ?? [], {
                        shouldDirty: true,
                        shouldValidate: form.formState.isSubmitted,
                      })
                    }
                  >
                    Fill in the drugs of the last hold ({clockTime(dto.lastInfusions.observedAt, timeZone, nowMs)}); rates are
                    read again
                  </Button>
                </div>
              ) : null}
            </div>
          </>
        ) : null}
        <TextareaField control={form.control} name="note" label="Note, if needed" rows={2} maxLength={1000} />
        <ObservedField
          control={form.control}
          name="observed"
          timeZone={timeZone}
          nowMs={nowMs}
          label={isRunning && verdict.result !== 'unsafe' ? 'Hold starts at' : 'Assessed at'}
        />
        <FormErrorSummary control={form.control} submit={submit} />
        <div>
          <SubmitButton isSending={submit.isSending}>{submitWords(sedation, verdict.result, isAmending)}</SubmitButton>
        </div>
      </Form>
      <ConflictDialog
        failure={submit.failure}
        patientId={patientId}
        what="hold"
        onRecordAnyway={
          isAmending
            ? undefined
            : () => {
                form.setValue('recordAnyway', true)
                frame.current?.querySelector('form')?.requestSubmit()
              }
        }
      />
    </div>
  )
}

function submitWords(sedation: unknown, safety: 'safe' | 'unsafe' | 'incomplete', isAmending: boolean): string {
  if (isAmending) return 'Record correction'
  if (sedation === 'not_needed') return 'Record: hold not needed'
  if (sedation === 'started' && safety === 'unsafe') return 'Record: hold unsafe today'
  return sedation === 'started' ? 'Start the hold' : 'Record'
}
