'use client'

import { useRouter } from 'next/navigation'
import { useRef, type KeyboardEvent } from 'react'
import { useWatch } from 'react-hook-form'
import { AmendPanel } from '@/components/episodes/amend-panel'
import { CarriedValues } from '@/components/episodes/carried-values'
import { ConflictDialog } from '@/components/episodes/conflict-dialog'
import { ObservationFields } from '@/components/episodes/observation-fields'
import { OBSERVED_NUMBERS, type ObservedNumber } from '@/components/episodes/observation-values'
import { ReadingField } from '@/components/episodes/reading-field'
import { readingLabel } from '@/components/episodes/reading-label'
import { useObservedNow } from '@/components/episodes/use-observed-now'
import { ChoiceField } from '@/components/forms/choice-field'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { NumberField } from '@/components/forms/number-field'
import { ObservedField } from '@/components/forms/observed-field'
import { SubmitButton } from '@/components/forms/submit-button'
import { TextareaField } from '@/components/forms/textarea-field'
import { UnsavedGuard } from '@/components/forms/unsaved-guard'
import { useSubmit } from '@/components/forms/use-submit'
import { Button } from '@/components/ui/button'
import { patientKeys } from '@/lib/client/keys/patients'
import { stepKeys } from '@/lib/client/keys/steps'
import { todayKeys } from '@/lib/client/keys/today'
import type { TrialFormDto } from '@/lib/schemas/trials'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { TRIAL_TECHNIQUES } from '@/lib/weaning/vocabulary'
import { TECHNIQUE_WORDS } from '@/lib/weaning/words'
import { ReadinessLines } from './readiness-lines'
import { useTrialStart, type CarriedField } from './use-trial-start'

/** The start of a breathing trial: technique with its numbers, planned length, baseline. */
export function TrialStartForm({ dto, nowMs }: { dto: TrialFormDto; nowMs: number }) {
  const router = useRouter()
  const frame = useRef<HTMLDivElement>(null)
  const { form, carried, confirm } = useTrialStart(dto)
  const { patientId, episodeId, timeZone } = dto.patient
  const { shortestMin, longestMin } = dto.protocol.content.trial
  const amended = dto.amending?.kind === 'start' ? dto.amending.trial : null
  const open = Object.keys(carried)
  useObservedNow(form, nowMs, timeZone, amended === null)
  const technique = useWatch({ control: form.control, name: 'technique' })
  const needsReason = !dto.readiness.isInOrder || amended?.startedAnywayBecause != null
  const submit = useSubmit({
    form,
    path: `/api/episodes/${episodeId}/trials`,
    onRecorded: () => {
      form.reset(form.getValues())
      if (amended) router.push(`/patients/${patientId}`)
    },
    invalidates: [stepKeys.root, todayKeys.root, patientKeys.root],
  })
  const beside = (name: CarriedField, label: string) =>
    name in carried ? (
      <CarriedValues
        observedAt={[carried[name]]}
        onConfirm={() => confirm([name])}
        label={label}
        timeZone={timeZone}
        nowMs={nowMs}
      />
    ) : undefined
  const confirmOnEnter = (event: KeyboardEvent<HTMLElement>) => {
    if (event.key === 'Enter' && event.target instanceof HTMLInputElement) confirm([event.target.name])
  }

  return (
    <div ref={frame}>
      <UnsavedGuard isDirty={form.formState.isDirty} />
      {amended ? (
        <AmendPanel form={form} entry={amended} timeZone={timeZone} nowMs={nowMs} />
      ) : (
        <ReadinessLines readiness={dto.readiness} timeZone={timeZone} nowMs={nowMs} />
      )}
      <Form submit={submit} label="Start of the breathing trial" className="flex flex-col gap-8">
        <fieldset className="flex flex-col gap-5" onKeyDown={confirmOnEnter}>
          <legend className="mb-3 text-lg font-bold">Technique</legend>
          <ChoiceField
            control={form.control}
            name="technique"
            label="Technique"
            isLabelHidden
            options={TRIAL_TECHNIQUES.map((value) => ({ value, label: sentenceCase(TECHNIQUE_WORDS[value]) }))}
            onChosen={(value) => {
              if (value !== 'pressure_support') form.setValue('pressureSupportCmH2O', null)
              if (value === 't_piece') form.setValue('peepCmH2O', null)
            }}
          />
          <div className="flex flex-wrap gap-x-5 gap-y-4">
            {technique === 'pressure_support' ? (
              <ReadingField form={form} name="pressureSupportCmH2O" reading="pressureSupportCmH2O" />
            ) : null}
            {technique === 'pressure_support' || technique === 'cpap' ? (
              <ReadingField form={form} name="peepCmH2O" reading="peepCmH2O" label={technique === 'cpap' ? 'CPAP' : undefined} />
            ) : null}
            <ReadingField
              form={form}
              name="fio2Fraction"
              reading="fio2Fraction"
              beside={beside('fio2Fraction', 'FiO2')}
              onTyped={() => confirm(['fio2Fraction'])}
            />
            <NumberField
              control={form.control}
              name="plannedDurationMin"
              label="Planned length"
              unit="min"
              digits={4}
              isWhole
              hint={`The unit’s protocol: ${shortestMin} to ${longestMin} min`}
            />
          </div>
        </fieldset>
        <fieldset className="flex flex-col gap-5" onKeyDown={confirmOnEnter}>
          <legend className="mb-3 text-lg font-bold">Baseline, just before the start</legend>
          {open.length > 1 ? (
            <div>
              <Button onClick={() => confirm(open)}>Confirm all {open.length} carried-over values</Button>
            </div>
          ) : null}
          <ObservationFields
            form={form}
            at="baseline"
            numbers={OBSERVED_NUMBERS}
            hasGas
            signsLabel="Signs already there"
            besideOf={(reading) => (isCarriedReading(reading) ? beside(`baseline.${reading}`, readingLabel(reading)) : undefined)}
            onTyped={(reading) => confirm([`baseline.${reading}`])}
          />
        </fieldset>
        {needsReason ? (
          <TextareaField
            control={form.control}
            name="startedAnywayBecause"
            label="Why the trial starts all the same"
            rows={2}
            maxLength={500}
          />
        ) : null}
        <ObservedField control={form.control} name="observed" timeZone={timeZone} nowMs={nowMs} label="Trial starts at" />
        <FormErrorSummary control={form.control} submit={submit} />
        <div>
          <SubmitButton isSending={submit.isSending}>{amended ? 'Record correction' : 'Start the trial'}</SubmitButton>
        </div>
      </Form>
      <ConflictDialog
        failure={submit.failure}
        patientId={patientId}
        what="trial"
        onRecordAnyway={
          amended
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

function isCarriedReading(reading: ObservedNumber): reading is 'breathsPerMin' | 'tidalVolumeMl' | 'spo2Percent' {
  return reading === 'breathsPerMin' || reading === 'tidalVolumeMl' || reading === 'spo2Percent'
}
