'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useRouter } from 'next/navigation'
import { useForm, useWatch } from 'react-hook-form'
import { notAnswered } from '@/components/episodes/not-answered'
import { PatientLine } from '@/components/episodes/patient-line'
import { useObservedNow } from '@/components/episodes/use-observed-now'
import { useServerNow } from '@/components/episodes/use-server-now'
import { ChoiceField } from '@/components/forms/choice-field'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { ObservedField } from '@/components/forms/observed-field'
import { SubmitButton } from '@/components/forms/submit-button'
import { UnsavedGuard } from '@/components/forms/unsaved-guard'
import { useSubmit } from '@/components/forms/use-submit'
import { Notice } from '@/components/ui/notice'
import { PageHeading } from '@/components/ui/page-heading'
import { patientKeys } from '@/lib/client/keys/patients'
import { todayKeys } from '@/lib/client/keys/today'
import { wallClock } from '@/lib/client/wall-clock'
import { beginEpisodeSchema } from '@/lib/schemas/episodes'
import type { PatientPageDto } from '@/lib/schemas/patient-page'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { AIRWAYS, EPISODE_STARTS, type Airway, type EpisodeStart } from '@/lib/weaning/vocabulary'
import { AIRWAY_WORDS, EPISODE_START_WORDS } from '@/lib/weaning/words'

/** The airway that goes with a way of starting; null where either is possible and somebody has to say. */
const AIRWAY_OF_START: Record<EpisodeStart, Airway | null> = {
  intubated: 'endotracheal_tube',
  reintubated: 'endotracheal_tube',
  ventilator_on: 'tracheostomy',
  arrived_intubated: null,
}

export type BeginPageDto = Pick<
  PatientPageDto,
  'patient' | 'unit' | 'stay' | 'episode' | 'predictedBodyWeightKg' | 'may' | 'nowMs'
>

/** The beginning of an episode of ventilation: how, through which airway, when. */
export function BeginPage({ page }: { page: BeginPageDto }) {
  const { patient, unit, stay, episode } = page
  const isVentilated = episode !== null && episode.endedAt === null
  const weight = page.predictedBodyWeightKg
  const line = {
    ...patient,
    patientId: patient.id,
    bedLabel: stay.bedLabel,
    predictedBodyWeightKg: weight.known ? weight.value : null,
    ventilatorDayNumber: null,
  }
  const refusal = isVentilated
    ? 'Ventilation is running for this patient already.'
    : stay.endedAt !== null
      ? 'This patient is in no bed now. Admit the patient first.'
      : page.may['episode.begin']
        ? null
        : 'An RT, a nurse or a physician of this unit records this.'
  return (
    <>
      <PageHeading title="Begin ventilation" above={<PatientLine patient={line} />} />
      {refusal ? (
        <Notice tone="wait" title="Not possible now">
          {refusal}
        </Notice>
      ) : (
        <BeginForm patientId={patient.id} timeZone={unit.timeZone} openedAtMs={page.nowMs} />
      )}
    </>
  )
}

function BeginForm({ patientId, timeZone, openedAtMs }: { patientId: string; timeZone: string; openedAtMs: number }) {
  const router = useRouter()
  const nowMs = useServerNow(openedAtMs)
  const form = useForm({
    shouldFocusError: false,
    resolver: zodResolver(beginEpisodeSchema),
    defaultValues: {
      patientId,
      observed: wallClock(openedAtMs, timeZone),
      start: notAnswered<EpisodeStart>(),
      airway: notAnswered<Airway>(),
    },
  })
  useObservedNow(form, nowMs, timeZone, true)
  const start = useWatch({ control: form.control, name: 'start' })
  const submit = useSubmit({
    form,
    path: `/api/patients/${patientId}/episodes`,
    onRecorded: () => {
      form.reset(form.getValues())
      router.push(`/patients/${patientId}`)
    },
    invalidates: [todayKeys.root, patientKeys.root],
  })
  return (
    <>
      <UnsavedGuard isDirty={form.formState.isDirty} />
      <Form submit={submit} label="Begin ventilation" className="flex flex-col gap-7">
        <ChoiceField
          control={form.control}
          name="start"
          label="How ventilation began"
          options={EPISODE_STARTS.map((value) => ({ value, label: sentenceCase(EPISODE_START_WORDS[value]) }))}
          onChosen={(value) => {
            const airway = EPISODE_STARTS.find((each) => each === value)
            if (airway)
              form.setValue('airway', AIRWAY_OF_START[airway] ?? notAnswered<Airway>(), {
                shouldValidate: form.formState.isSubmitted && AIRWAY_OF_START[airway] !== null,
              })
          }}
        />
        <ChoiceField
          control={form.control}
          name="airway"
          label="Airway"
          hint={start === 'ventilator_on' ? 'Taken up again through the tracheostomy.' : undefined}
          options={AIRWAYS.map((value) => ({ value, label: sentenceCase(AIRWAY_WORDS[value]) }))}
        />
        <ObservedField control={form.control} name="observed" label="Ventilated here since" timeZone={timeZone} nowMs={nowMs} />
        <FormErrorSummary control={form.control} submit={submit} />
        <div>
          <SubmitButton isSending={submit.isSending}>Begin ventilation</SubmitButton>
        </div>
      </Form>
    </>
  )
}
