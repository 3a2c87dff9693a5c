'use client'

import { useRouter } from 'next/navigation'
import { useRef } from 'react'
import { useWatch } from 'react-hook-form'
import { AmendPanel } from '@/components/episodes/amend-panel'
import { ConflictDialog } from '@/components/episodes/conflict-dialog'
import { CheckListField } from '@/components/forms/check-field'
import { ChoiceField } from '@/components/forms/choice-field'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { PasswordField } from '@/components/forms/password-field'
import { SubmitButton } from '@/components/forms/submit-button'
import { TextareaField } from '@/components/forms/textarea-field'
import { UnsavedGuard } from '@/components/forms/unsaved-guard'
import { useSubmit } from '@/components/forms/use-submit'
import { YesNoField } from '@/components/forms/yes-no-field'
import { Button } from '@/components/ui/button'
import { Notice } from '@/components/ui/notice'
import { patientKeys } from '@/lib/client/keys/patients'
import { stepKeys } from '@/lib/client/keys/steps'
import { todayKeys } from '@/lib/client/keys/today'
import { shortDay } from '@/lib/client/wall-clock'
import { decisionWords } from '@/lib/schemas/decision-statement'
import type { DecisionFormDto } from '@/lib/schemas/decisions'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { DECISION_CHOICES, NOT_TODAY_REASONS, SUPPORTS_AFTER } from '@/lib/weaning/vocabulary'
import { DECISION_WORDS, NOT_TODAY_WORDS, SUPPORT_WORDS } from '@/lib/weaning/words'
import { LookAgainField } from './look-again-field'
import { useDecisionForm } from './use-decision-form'

type Props = {
  /** As the page was opened: what is signed is what stood there. */
  dto: DecisionFormDto
  /** The evidence changed since; the page has to be read again before it can be signed. */
  isEvidenceChanged: boolean
  onReadAgain: () => void
  onSigned: () => void
  nowMs: number
}

/** The physician's decision: choice with nothing preselected, its reasons and plan, what is being signed, and the signature. */
export function DecisionForm({ dto, isEvidenceChanged, onReadAgain, onSigned, nowMs }: Props) {
  const router = useRouter()
  const frame = useRef<HTMLDivElement>(null)
  const form = useDecisionForm(dto)
  const { patientId, episodeId, timeZone, unitName } = dto.patient
  const [choice, reasons, lookAgain, supportAfter, steroidsPlanned, note] = useWatch({
    control: form.control,
    name: ['choice', 'reasons', 'lookAgain', 'supportAfter', 'steroidsPlanned', 'note'],
  })
  const isNotToday = choice === 'not_today'
  const hasSupport = choice === 'extubate' || choice === 'comfort_extubation'
  const submit = useSubmit({
    form,
    path: `/api/episodes/${episodeId}/decisions`,
    // What stood on the page when it was signed, which may have been read again since the form was opened.
    toBody: (values) => ({ ...values, seenEvidenceHash: dto.evidenceHash, seenLatestId: dto.seenLatestId }),
    onRecorded: () => {
      form.reset({ ...form.getValues(), password: '' })
      if (dto.amending) router.push(`/patients/${patientId}`)
      else onSigned()
    },
    invalidates: [stepKeys.root, todayKeys.root, patientKeys.root],
  })
  return (
    <div ref={frame} className="mt-8 border-t-2 border-ink pt-5">
      <UnsavedGuard isDirty={form.formState.isDirty} />
      <h2 className="mb-4 text-lg font-bold">Decision</h2>
      <AmendPanel form={form} entry={dto.amending} timeZone={timeZone} nowMs={nowMs} />
      <Form submit={submit} label="Decision" className="flex flex-col gap-7">
        <ChoiceField
          control={form.control}
          name="choice"
          label="What do you decide?"
          options={DECISION_CHOICES.map((value) => ({ value, label: sentenceCase(DECISION_WORDS[value]) }))}
        />
        {choice === 'extubate' && dto.isTrialRunning ? (
          <Notice tone="stop" title="A breathing trial is running">
            Its end is recorded before a decision to extubate.
          </Notice>
        ) : null}
        {isNotToday ? (
          <>
            <CheckListField
              control={form.control}
              name="reasons"
              label="Reasons"
              options={NOT_TODAY_REASONS.map((value) => ({ value, label: sentenceCase(NOT_TODAY_WORDS[value]) }))}
            />
            <LookAgainField control={form.control} today={dto.wallClock.day} />
          </>
        ) : null}
        {hasSupport ? (
          <>
            <ChoiceField
              control={form.control}
              name="supportAfter"
              label="Support planned after extubation"
              options={SUPPORTS_AFTER.map((value) => ({ value, label: sentenceCase(SUPPORT_WORDS[value]) }))}
            />
            <YesNoField
              control={form.control}
              name="steroidsPlanned"
              label="Steroids before extubation planned"
              clearLabel="not stated"
            />
          </>
        ) : null}
        <TextareaField control={form.control} name="note" label="Note" rows={3} maxLength={2000} />
        {choice ? (
          <section aria-label="What you sign" className="border-l-4 border-ink py-1 pl-4">
            <p className="text-sm text-muted">You sign this</p>
            <p className="max-w-reading text-lg">
              {decisionWords({
                choice,
                reasons: isNotToday ? reasons : [],
                lookAgainWords: isNotToday && lookAgain?.time ? `${shortDay(lookAgain.day)} ${lookAgain.time}` : null,
                supportAfter: hasSupport ? supportAfter : null,
                steroidsPlanned: hasSupport ? steroidsPlanned : null,
                note,
              })}{' '}
              Signed by {dto.signerName}, physician, {unitName}, with the evidence above as it stands in the record.
            </p>
          </section>
        ) : null}
        {isEvidenceChanged ? (
          <Notice tone="stop" role="alert" title="The record changed while this page was open">
            <p>What you would sign is no longer what stands in the record. What you typed stays.</p>
            <Button className="mt-2" onClick={onReadAgain}>
              Show the record as it stands now
            </Button>
          </Notice>
        ) : null}
        <PasswordField control={form.control} name="password" label="Your password, to sign" autoComplete="current-password" />
        <FormErrorSummary control={form.control} submit={submit} />
        <div>
          <SubmitButton isSending={submit.isSending} sendingLabel="Signing…">
            Sign the decision
          </SubmitButton>
        </div>
      </Form>
      <ConflictDialog
        failure={isEvidenceChanged ? null : submit.failure}
        patientId={patientId}
        what="decision"
        onRecordAnyway={
          dto.amending
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
