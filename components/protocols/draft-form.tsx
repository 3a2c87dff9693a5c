'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useRouter } from 'next/navigation'
import type { ReactNode } from 'react'
import { useForm } from 'react-hook-form'
import { CheckListField } from '@/components/forms/check-field'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { NumberField } from '@/components/forms/number-field'
import { SubmitButton } from '@/components/forms/submit-button'
import { TextareaField } from '@/components/forms/textarea-field'
import { UnsavedGuard } from '@/components/forms/unsaved-guard'
import { useSubmit } from '@/components/forms/use-submit'
import { saveDraftSchema, type ProtocolPageDto } from '@/lib/schemas/protocols'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { HOLD_SAFETY_ITEMS } from '@/lib/weaning/vocabulary'
import { HOLD_SAFETY_WORDS } from '@/lib/weaning/words'
import { DraftScreen } from './draft-screen'
import { DraftStopRules } from './draft-stop-rules'
import { MinuteOfDayField } from './minute-of-day-field'
import { NumberListField } from './number-list-field'

const useDraft = ({ unit, current, draft }: ProtocolPageDto) =>
  useForm({
    resolver: zodResolver(saveDraftSchema),
    defaultValues: {
      unitId: unit.id,
      version: draft?.version ?? null,
      content: (draft ?? current).content,
      note: draft?.note ?? '',
    },
  })
export type DraftForm = ReturnType<typeof useDraft>

const SAFETY_OPTIONS = HOLD_SAFETY_ITEMS.map((item) => ({ value: item, label: sentenceCase(HOLD_SAFETY_WORDS[item]) }))

/** The unit lead's draft of the next protocol version; it starts from the one in force. */
export function DraftForm({ page }: { page: ProtocolPageDto }) {
  const router = useRouter()
  const form = useDraft(page)
  const { control } = form
  const submit = useSubmit({
    form,
    path: `/api/units/${page.unit.id}/protocol/draft`,
    onRecorded: () => {
      form.reset(form.getValues())
      router.push(`/units/${page.unit.id}/protocol`)
      router.refresh()
    },
  })
  return (
    <Form submit={submit} label="Draft of the protocol" className="flex max-w-[60rem] flex-col gap-10">
      <UnsavedGuard isDirty={form.formState.isDirty} />
      <Part title="Screening window">
        <MinuteOfDayField control={control} name="content.screeningWindow.opensMin" label="Opens" />
        <MinuteOfDayField control={control} name="content.screeningWindow.closesMin" label="Closes" />
      </Part>
      <Part title="Criteria of the daily screen" isWide>
        <DraftScreen form={form} />
      </Part>
      <Part title="Sedation hold" isWide>
        <CheckListField
          control={control}
          name="content.hold.safetyItems"
          label="Not started when any of these is present"
          options={SAFETY_OPTIONS}
        />
        <div className="flex flex-wrap gap-6">
          <NumberField control={control} name="content.hold.startWithinMin" label="Due after a ready screen" unit="min" isWhole />
          <NumberField control={control} name="content.hold.observeEveryMin" label="Observed every" unit="min" isWhole />
          <NumberField control={control} name="content.hold.toleratedAfterMin" label="Tolerated after" unit="min" isWhole />
          <NumberField control={control} name="content.hold.restartFraction" label="Restart at this part of the rate" />
        </div>
        <DraftStopRules form={form} name="content.hold.failRules" label="Rules that end a hold" />
      </Part>
      <Part title="Breathing trial" isWide>
        <div className="flex flex-wrap gap-6">
          <NumberField
            control={control}
            name="content.pairingWindowMin"
            label="Pairing window, from the start of the hold"
            unit="min"
            isWhole
          />
          <NumberField control={control} name="content.trial.startWithinMin" label="Due after the hold" unit="min" isWhole />
          <NumberField control={control} name="content.trial.defaultDurationMin" label="Usual length" unit="min" isWhole />
          <NumberField control={control} name="content.trial.shortestMin" label="Shortest" unit="min" isWhole />
          <NumberField control={control} name="content.trial.longestMin" label="Longest" unit="min" isWhole />
          <NumberField
            control={control}
            name="content.trial.retryWithinMin"
            label="Due again after a stopped trial"
            unit="min"
            isWhole
          />
        </div>
        <NumberListField
          control={control}
          name="content.trial.observationMinutes"
          label="Observed at minute"
          hint="In rising order, with commas between."
        />
        <DraftStopRules form={form} name="content.trial.stopRules" label="Rules that stop a trial" />
      </Part>
      <Part title="Decision and watch">
        <NumberField
          control={control}
          name="content.decision.answerWithinMin"
          label="Answer to a passed trial within"
          unit="min"
          isWhole
        />
        <NumberField
          control={control}
          name="content.decision.extubateWithinMin"
          label="Signed extubation carried out within"
          unit="min"
          isWhole
        />
        <NumberListField control={control} name="content.watch.hours" label="Watch after extubation, hours" />
      </Part>
      <TextareaField control={control} name="note" label="What changes, and why" />
      <FormErrorSummary control={control} submit={submit} />
      <div className="flex flex-wrap items-center gap-4">
        <SubmitButton isSending={submit.isSending} sendingLabel="Saving…">
          Save the draft
        </SubmitButton>
        <p className="text-muted">A draft changes nothing until a physician approves it.</p>
      </div>
    </Form>
  )
}

function Part({ title, isWide, children }: { title: string; isWide?: boolean; children: ReactNode }) {
  return (
    <section className="flex flex-col gap-4">
      <h2 className="text-xl font-bold">{title}</h2>
      <div className={isWide ? 'flex flex-col gap-6' : 'flex flex-wrap gap-6'}>{children}</div>
    </section>
  )
}
