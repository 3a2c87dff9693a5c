'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useRouter } from 'next/navigation'
import { useForm } from 'react-hook-form'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { ObservedField } from '@/components/forms/observed-field'
import { SelectField } from '@/components/forms/select-field'
import { SubmitButton } from '@/components/forms/submit-button'
import { UnsavedGuard } from '@/components/forms/unsaved-guard'
import { useSubmit } from '@/components/forms/use-submit'
import { Button } from '@/components/ui/button'
import { patientKeys } from '@/lib/client/keys/patients'
import { stepKeys } from '@/lib/client/keys/steps'
import { todayKeys } from '@/lib/client/keys/today'
import { clockTime, wallClock } from '@/lib/client/wall-clock'
import { formatDuration } from '@/lib/shared/format'
import type { SettingsFormDto } from '@/lib/schemas/bedside-forms'
import { recordSettingsSchema, type SettingsDto } from '@/lib/schemas/settings'
import { VENTILATOR_MODES, type VentilatorMode } from '@/lib/weaning/vocabulary'
import { MODE_WORDS } from '@/lib/weaning/words'
import { AmendPanel } from './amend-panel'
import { notAnswered } from './not-answered'
import { ReadingField } from './reading-field'
import { StepPage } from './step-page'
import { useObservedNow } from './use-observed-now'
import { useServerNow } from './use-server-now'

const SET = ['setRatePerMin', 'setTidalVolumeMl', 'inspiratoryPressureCmH2O', 'pressureSupportCmH2O'] as const
const MEASURED = ['measuredRatePerMin', 'measuredTidalVolumeMl', 'peakPressureCmH2O', 'plateauPressureCmH2O', 'spo2Percent'] as const

/** What is set on the ventilator; measured values are read anew each time. */
function setValues(from: SettingsDto | null) {
  return {
    mode: from?.mode ?? notAnswered<VentilatorMode>(), fio2Fraction: from?.fio2Fraction ?? notAnswered<number>(), peepCmH2O: from?.peepCmH2O ?? notAnswered<number>(),
    setRatePerMin: from?.setRatePerMin ?? null, setTidalVolumeMl: from?.setTidalVolumeMl ?? null,
    inspiratoryPressureCmH2O: from?.inspiratoryPressureCmH2O ?? null, pressureSupportCmH2O: from?.pressureSupportCmH2O ?? null,
  }
}

/** Ventilator settings of a moment, with what was measured at it. */
export function SettingsPage({ initial: dto }: { initial: SettingsFormDto }) {
  const router = useRouter()
  const { amending, latest } = dto
  const { episodeId, patientId, timeZone } = dto.patient
  const nowMs = useServerNow(dto.nowMs)
  const form = useForm({
    resolver: zodResolver(recordSettingsSchema),
    defaultValues: {
      episodeId,
      observed: amending ? wallClock(amending.observedAt, timeZone) : dto.wallClock,
      amends: amending ? { id: amending.id, reason: '' } : null,
      ...setValues(amending),
      measuredRatePerMin: amending?.measuredRatePerMin ?? null, measuredTidalVolumeMl: amending?.measuredTidalVolumeMl ?? null,
      peakPressureCmH2O: amending?.peakPressureCmH2O ?? null, plateauPressureCmH2O: amending?.plateauPressureCmH2O ?? null,
      spo2Percent: amending?.spo2Percent ?? null, confirmedUnlikely: amending?.unlikely ?? [],
    },
  })
  useObservedNow(form, nowMs, timeZone, amending === null)
  const submit = useSubmit({
    form,
    path: `/api/episodes/${episodeId}/settings`,
    onRecorded: () => {
      form.reset(form.getValues())
      router.push(`/patients/${patientId}`)
    },
    invalidates: [todayKeys.root, patientKeys.root, stepKeys.root],
  })
  const takeOver = () => {
    for (const [name, value] of Object.entries(setValues(latest))) form.setValue(name as keyof ReturnType<typeof setValues>, value, { shouldDirty: true, shouldValidate: form.formState.isSubmitted })
  }
  return (
    <StepPage title={amending ? 'Correct the settings' : 'Ventilator settings'} form={dto}>
      <UnsavedGuard isDirty={form.formState.isDirty} />
      <AmendPanel form={form} entry={amending} timeZone={timeZone} nowMs={nowMs} />
      <Form submit={submit} label="Ventilator settings" className="flex flex-col gap-7">
        {latest && !amending ? (
          <div>
            <Button onClick={takeOver}>Settings unchanged since {clockTime(latest.observedAt, timeZone, nowMs)}, {formatDuration(nowMs - latest.observedAt)} ago: take them over</Button>
          </div>
        ) : null}
        <fieldset className="flex flex-wrap gap-x-5 gap-y-4">
          <legend className="mb-3 text-lg font-bold">Set</legend>
          <SelectField control={form.control} name="mode" label="Mode" options={VENTILATOR_MODES.map((mode) => ({ value: mode, label: `${mode}: ${MODE_WORDS[mode]}` }))} className="w-full" />
          <ReadingField form={form} name="fio2Fraction" reading="fio2Fraction" />
          <ReadingField form={form} name="peepCmH2O" reading="peepCmH2O" />
          {SET.map((reading) => <ReadingField key={reading} form={form} name={reading} reading={reading} />)}
        </fieldset>
        <fieldset className="flex flex-wrap gap-x-5 gap-y-4">
          <legend className="mb-3 text-lg font-bold">Measured</legend>
          {MEASURED.map((reading) => <ReadingField key={reading} form={form} name={reading} reading={reading} />)}
        </fieldset>
        <ObservedField control={form.control} name="observed" timeZone={timeZone} nowMs={nowMs} />
        <FormErrorSummary control={form.control} submit={submit} />
        <div><SubmitButton isSending={submit.isSending}>{amending ? 'Record correction' : 'Record settings'}</SubmitButton></div>
      </Form>
    </StepPage>
  )
}
