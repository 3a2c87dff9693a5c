'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useRouter } from 'next/navigation'
import { useForm, useWatch } from 'react-hook-form'
import { useServerNow } from '@/components/episodes/use-server-now'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { ObservedField } from '@/components/forms/observed-field'
import { SelectField } from '@/components/forms/select-field'
import { SubmitButton } from '@/components/forms/submit-button'
import { UnsavedGuard } from '@/components/forms/unsaved-guard'
import { useSubmit } from '@/components/forms/use-submit'
import { ButtonLink } from '@/components/ui/button'
import { Notice } from '@/components/ui/notice'
import { PageHeading } from '@/components/ui/page-heading'
import { patientKeys } from '@/lib/client/keys/patients'
import { todayKeys } from '@/lib/client/keys/today'
import { wallClock } from '@/lib/client/wall-clock'
import { moveStaySchema, type MoveFormDto } from '@/lib/schemas/stays'
import { freeBedOptions } from './free-bed-options'

/** A move to another bed, of this unit or another one of the hospital. */
export function MovePage({ dto }: { dto: MoveFormDto }) {
  const { patient, stay, units, timeZone } = dto
  const router = useRouter()
  const nowMs = useServerNow(dto.nowMs)
  const form = useForm({
    resolver: zodResolver(moveStaySchema),
    defaultValues: { patientId: patient.id, stayId: stay.id, unitId: stay.unitId, observed: wallClock(dto.nowMs, timeZone) },
  })
  const unitId = useWatch({ control: form.control, name: 'unitId' })
  const options = freeBedOptions(units, unitId)
  const isAway = unitId !== stay.unitId
  const submit = useSubmit({
    form,
    path: `/api/patients/${patient.id}/move`,
    invalidates: [todayKeys.root, patientKeys.root],
    onRecorded: () => {
      form.reset(form.getValues())
      // From another unit's bed the patient is no longer the reader's, as a rule.
      router.push(isAway ? `/units/${stay.unitId}/today` : `/patients/${patient.id}`)
    },
  })
  return (
    <>
      <PageHeading
        title="Move to another bed"
        above={
          <p>
            <span className="figure text-xl font-semibold text-ink">{stay.bedLabel}</span> {patient.familyName},{' '}
            {patient.givenName}
          </p>
        }
        aside={<ButtonLink href={`/patients/${patient.id}/leave`}>Leaves the unit, or died</ButtonLink>}
      />
      <UnsavedGuard isDirty={form.formState.isDirty} />
      <Form submit={submit} label="Move to another bed" className="flex flex-col gap-6">
        <SelectField
          control={form.control}
          name="unitId"
          label="Unit"
          options={units.map(({ id, name }) => ({ value: id, label: name }))}
          prompt="Choose the unit"
        />
        <SelectField
          key={unitId}
          control={form.control}
          name="bedId"
          label="Free bed"
          options={options}
          prompt={options.length > 0 ? 'Choose the bed' : 'No free bed'}
        />
        {isAway ? (
          <Notice tone="info" title="To another unit">
            The record goes with the patient. People of this unit who do not belong to the other one can no longer open it.
          </Notice>
        ) : null}
        <ObservedField control={form.control} name="observed" label="Moved at" timeZone={timeZone} nowMs={nowMs} />
        <FormErrorSummary control={form.control} submit={submit} />
        <div>
          <SubmitButton isSending={submit.isSending}>Record the move</SubmitButton>
        </div>
      </Form>
    </>
  )
}
