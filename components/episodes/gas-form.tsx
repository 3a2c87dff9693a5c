'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useRouter } from 'next/navigation'
import { useForm } from 'react-hook-form'
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
import type { GasFormDto } from '@/lib/schemas/bedside-forms'
import { recordGasSchema } from '@/lib/schemas/gases'
import { AmendPanel } from './amend-panel'
import { notAnswered } from './not-answered'
import { ReadingField } from './reading-field'
import { StepPage } from './step-page'
import { useObservedNow } from './use-observed-now'
import { useServerNow } from './use-server-now'

/** An arterial blood gas, with the FiO2 at the time it was drawn. */
export function GasPage({ initial: dto }: { initial: GasFormDto }) {
  const router = useRouter()
  const { amending } = dto
  const { episodeId, patientId, timeZone } = dto.patient
  const nowMs = useServerNow(dto.nowMs)
  const form = useForm({
    resolver: zodResolver(recordGasSchema),
    defaultValues: {
      episodeId,
      observed: amending ? wallClock(amending.observedAt, timeZone) : dto.wallClock,
      amends: amending ? { id: amending.id, reason: '' } : null,
      ph: amending?.ph ?? notAnswered<number>(), paCO2MmHg: amending?.paCO2MmHg ?? notAnswered<number>(), paO2MmHg: amending?.paO2MmHg ?? notAnswered<number>(),
      fio2Fraction: amending?.fio2Fraction ?? notAnswered<number>(), bicarbonateMmolPerL: amending?.bicarbonateMmolPerL ?? null,
      lactateMmolPerL: amending?.lactateMmolPerL ?? null, haemoglobinGPerDl: amending?.haemoglobinGPerDl ?? null, confirmedUnlikely: amending?.unlikely ?? [],
    },
  })
  useObservedNow(form, nowMs, timeZone, amending === null)
  const submit = useSubmit({
    form,
    path: `/api/episodes/${episodeId}/gases`,
    onRecorded: () => {
      form.reset(form.getValues())
      router.push(`/patients/${patientId}`)
    },
    invalidates: [todayKeys.root, patientKeys.root, stepKeys.root],
  })
  return (
    <StepPage title={amending ? 'Correct the blood gas' : 'Arterial blood gas'} form={dto}>
      <UnsavedGuard isDirty={form.formState.isDirty} />
      <AmendPanel form={form} entry={amending} timeZone={timeZone} nowMs={nowMs} />
      <Form submit={submit} label="Arterial blood gas" className="flex flex-col gap-7">
        <div className="flex flex-wrap gap-x-5 gap-y-4">
          <ReadingField form={form} name="ph" reading="ph" />
          <ReadingField form={form} name="paCO2MmHg" reading="paCO2MmHg" />
          <ReadingField form={form} name="paO2MmHg" reading="paO2MmHg" />
          <ReadingField form={form} name="fio2Fraction" reading="fio2Fraction" label="FiO2 when it was drawn" hint={dto.prefill.settings ? `Last recorded setting: ${dto.prefill.settings.fio2Fraction.toFixed(2)}` : undefined} />
        </div>
        <fieldset className="flex flex-wrap gap-x-5 gap-y-4">
          <legend className="mb-3 text-lg font-bold">If measured</legend>
          <ReadingField form={form} name="bicarbonateMmolPerL" reading="bicarbonateMmolPerL" />
          <ReadingField form={form} name="lactateMmolPerL" reading="lactateMmolPerL" />
          <ReadingField form={form} name="haemoglobinGPerDl" reading="haemoglobinGPerDl" />
        </fieldset>
        <ObservedField control={form.control} name="observed" timeZone={timeZone} nowMs={nowMs} label="Drawn at" />
        <FormErrorSummary control={form.control} submit={submit} />
        <div><SubmitButton isSending={submit.isSending}>{amending ? 'Record correction' : 'Record blood gas'}</SubmitButton></div>
      </Form>
    </StepPage>
  )
}
