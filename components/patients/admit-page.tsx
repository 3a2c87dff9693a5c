'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useRouter } from 'next/navigation'
import { useForm } from 'react-hook-form'
import { notAnswered } from '@/components/episodes/not-answered'
import { useObservedNow } from '@/components/episodes/use-observed-now'
import { useServerNow } from '@/components/episodes/use-server-now'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { ObservedField } from '@/components/forms/observed-field'
import { SelectField } from '@/components/forms/select-field'
import { SubmitButton } from '@/components/forms/submit-button'
import { UnsavedGuard } from '@/components/forms/unsaved-guard'
import { useSubmit } from '@/components/forms/use-submit'
import { Notice } from '@/components/ui/notice'
import { PageHeading } from '@/components/ui/page-heading'
import { patientKeys } from '@/lib/client/keys/patients'
import { todayKeys } from '@/lib/client/keys/today'
import { wallClock } from '@/lib/client/wall-clock'
import { admitPatientSchema, type AdmittedDto, type PatientListDto } from '@/lib/schemas/patients'
import { IdentityFields } from './identity-fields'

/** Admission to a bed of the unit. A record number the hospital knows is a readmission. */
export function AdmitPage({ list }: { list: Omit<PatientListDto, 'patients'> }) {
  const { unit, freeBeds, mayAdmit } = list
  const router = useRouter()
  const nowMs = useServerNow(list.nowMs)
  const form = useForm({
    shouldFocusError: false,
    resolver: zodResolver(admitPatientSchema),
    defaultValues: {
      unitId: unit.id,
      bedId: notAnswered<string>(),
      observed: wallClock(list.nowMs, unit.timeZone),
      recordNumber: '',
      familyName: '',
      givenName: '',
      birthDate: null,
      sex: null,
      heightCm: null,
      weightKg: null,
      confirmedUnlikely: [],
    },
  })
  useObservedNow(form, nowMs, unit.timeZone, true)
  const submit = useSubmit({
    form,
    path: `/api/units/${unit.id}/patients`,
    onRecorded: ({ patientId }: AdmittedDto) => {
      form.reset(form.getValues())
      router.push(`/patients/${patientId}`)
    },
    invalidates: [todayKeys.root, patientKeys.root],
  })
  const refusal = !mayAdmit
    ? 'An RT, a nurse or a physician of this unit admits patients.'
    : freeBeds.length === 0
      ? 'No bed of this unit is free. End a stay or move a patient first.'
      : null
  return (
    <>
      <PageHeading title="Admit a patient" below={unit.name} />
      {refusal ? (
        <Notice tone="wait" title="Not possible now">
          {refusal}
        </Notice>
      ) : (
        <>
          <UnsavedGuard isDirty={form.formState.isDirty} />
          <Form submit={submit} label="Admit a patient" className="flex flex-col gap-6">
            <SelectField
              control={form.control}
              name="bedId"
              label="Bed"
              prompt="Choose the bed"
              options={freeBeds.map(({ id, label }) => ({ value: id, label }))}
            />
            <IdentityFields form={form} today={wallClock(nowMs, unit.timeZone).day} />
            <ObservedField
              control={form.control}
              name="observed"
              label="In this bed since"
              timeZone={unit.timeZone}
              nowMs={nowMs}
            />
            <FormErrorSummary control={form.control} submit={submit} />
            <div>
              <SubmitButton isSending={submit.isSending}>Admit</SubmitButton>
            </div>
          </Form>
        </>
      )}
    </>
  )
}
