'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useRouter } from 'next/navigation'
import { useForm } from 'react-hook-form'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { SubmitButton } from '@/components/forms/submit-button'
import { UnsavedGuard } from '@/components/forms/unsaved-guard'
import { useSubmit } from '@/components/forms/use-submit'
import { Notice } from '@/components/ui/notice'
import { PageHeading } from '@/components/ui/page-heading'
import { patientKeys } from '@/lib/client/keys/patients'
import { todayKeys } from '@/lib/client/keys/today'
import { correctPatientSchema, type CorrectPatientInput } from '@/lib/schemas/patients'
import type { PatientPageDto } from '@/lib/schemas/patient-page'
import { IdentityFields } from './identity-fields'

/** Correction of who the patient is. What was computed and recorded before stays as it was judged. */
export function CorrectPatientPage({ page }: { page: Pick<PatientPageDto, 'patient' | 'stay' | 'may' | 'today'> }) {
  const { patient } = page
  const router = useRouter()
  const { id: patientId, version, recordNumber, familyName, givenName, birthDate, sex, heightCm, weightKg, unlikely } = patient
  const values: CorrectPatientInput = {
    patientId,
    version,
    recordNumber,
    familyName,
    givenName,
    birthDate,
    sex,
    heightCm,
    weightKg,
    confirmedUnlikely: unlikely,
  }
  const form = useForm({ shouldFocusError: false, resolver: zodResolver(correctPatientSchema), defaultValues: values })
  const submit = useSubmit({
    form,
    path: `/api/patients/${patientId}`,
    onRecorded: () => {
      form.reset(form.getValues())
      router.push(`/patients/${patientId}`)
    },
    invalidates: [todayKeys.root, patientKeys.root],
  })
  return (
    <>
      <PageHeading
        title="Correct who this is"
        above={
          <p>
            <span className="figure text-xl font-semibold text-ink">{page.stay.bedLabel}</span> {familyName}, {givenName}
          </p>
        }
        below="The change and what stood before are kept in the audit log. Screens and trials already recorded are not judged again."
      />
      {page.may['patient.correct'] === true ? (
        <>
          <UnsavedGuard isDirty={form.formState.isDirty} />
          <Form submit={submit} label="Correct who this is" className="flex flex-col gap-6">
            <IdentityFields form={form} today={page.today} />
            <FormErrorSummary control={form.control} submit={submit} />
            <div>
              <SubmitButton isSending={submit.isSending}>Record the correction</SubmitButton>
            </div>
          </Form>
        </>
      ) : (
        <Notice tone="wait" title="To read only">
          An RT, a nurse or a physician of this unit corrects this.
        </Notice>
      )}
    </>
  )
}
