'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useState } from 'react'
import { useForm } from 'react-hook-form'
import { Toggle } from '@/components/forms/check-field'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { SubmitButton } from '@/components/forms/submit-button'
import { TextField } from '@/components/forms/text-field'
import { YesNoField } from '@/components/forms/yes-no-field'
import { useSubmit } from '@/components/forms/use-submit'
import { mailKeys } from '@/lib/client/keys/mail'
import { saveMailScheduleSchema, type MailPageDto } from '@/lib/schemas/mail'

type Schedule = NonNullable<MailPageDto['schedule']>

type MailScheduleFormProps = {
  unitId: string
  schedule: Schedule
  /** What stands here was saved by this reader a moment ago: the form is drawn anew with each version, so its page remembers. */
  isJustSaved: boolean
  onSaved: (version: number) => void
}

/** When the unit's lists go out. Only the unit lead sees it. */
export function MailScheduleForm({ unitId, schedule, isJustSaved, onSaved }: MailScheduleFormProps) {
  const [isMorningOn, setIsMorningOn] = useState(schedule.morningTime !== null)
  const form = useForm({ resolver: zodResolver(saveMailScheduleSchema), defaultValues: { unitId, ...schedule } })
  const submit = useSubmit({
    form,
    path: `/api/units/${unitId}/mail/schedule`,
    invalidates: [mailKeys.root],
    onRecorded: ({ version }: { version: number }) => onSaved(version),
  })
  return (
    <Form submit={submit} label="When mail goes out" className="flex flex-col gap-5">
      <FormErrorSummary control={form.control} submit={submit} />
      <Toggle
        label="Morning list of patients due"
        isOn={isMorningOn}
        onToggle={(isOn) => {
          setIsMorningOn(isOn)
          form.setValue('morningTime', isOn ? (schedule.morningTime ?? '05:00') : null, { shouldDirty: true })
        }}
      />
      {isMorningOn ? (
        <TextField
          control={form.control}
          name="morningTime"
          label="Morning list at"
          width={8}
          inputMode="numeric"
          hint="24-hour clock of the unit. It goes at this time, or later as soon as someone is due, until the window closes."
        />
      ) : null}
      <YesNoField
        control={form.control}
        name="isWindowEndOn"
        label="Reminder when the screening window closes"
        yes="on"
        no="off"
      />
      <YesNoField control={form.control} name="isDecisionOwedOn" label="Decision owed, to the physicians" yes="on" no="off" />
      <div className="flex flex-wrap items-center gap-4">
        <SubmitButton isSending={submit.isSending} sendingLabel="Saving…">
          Save
        </SubmitButton>
        <p role="status" className="text-calm">
          {isJustSaved && !form.formState.isDirty ? 'Saved.' : ''}
        </p>
      </div>
    </Form>
  )
}
