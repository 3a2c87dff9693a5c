'use client'

import { useRouter } from 'next/navigation'
import { useRef, useState, type FormEvent } from 'react'
import { AdultsOnly } from '@/components/episodes/adults-only'
import { AmendPanel } from '@/components/episodes/amend-panel'
import { ConflictDialog } from '@/components/episodes/conflict-dialog'
import { StepPage } from '@/components/episodes/step-page'
import { useLive } from '@/components/episodes/use-live'
import { useServerNow } from '@/components/episodes/use-server-now'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { ObservedField } from '@/components/forms/observed-field'
import { SubmitButton } from '@/components/forms/submit-button'
import { UnsavedGuard } from '@/components/forms/unsaved-guard'
import { useSubmit } from '@/components/forms/use-submit'
import { Button } from '@/components/ui/button'
import { Notice } from '@/components/ui/notice'
import { patientKeys } from '@/lib/client/keys/patients'
import { stepKeys } from '@/lib/client/keys/steps'
import { todayKeys } from '@/lib/client/keys/today'
import type { ScreenFormDto } from '@/lib/schemas/screens'
import { CriteriaList } from './criteria-list'
import { EarlierScreens } from './earlier-screens'
import { ExcuseFields } from './excuse-fields'
import { useScreenForm } from './use-screen-form'
import { VerdictPanel } from './verdict-panel'

type ScreenPageProps = { initial: ScreenFormDto; amend: string | null }

/** The page of the daily screen: earlier screens of the day, and the form for those who may record one. */
export function ScreenPage({ initial, amend }: ScreenPageProps) {
  const { episodeId } = initial.patient
  const path = `/api/episodes/${episodeId}/screens${amend ? `?amend=${encodeURIComponent(amend)}` : ''}`
  const { data, isStale } = useLive(stepKeys.form('screen', episodeId, amend), path, initial)
  const isOver = data.patient.episodeEndedAt !== null && amend === null
  const mayFill = (amend === null ? data.may.record : data.may.amend) && data.patient.isAdult === true && !isOver
  if (mayFill) return <ScreenForm initial={initial} live={data} isStale={isStale} />
  return (
    <StepPage title="Daily screen" form={data} isStale={isStale}>
      <AdultsOnly isAdult={data.patient.isAdult} patientId={data.patient.patientId} mayCorrect />
      {isOver ? (
        <Notice tone="info" title="Ventilation has ended">
          A screen belongs to an episode of ventilation. What was recorded can be corrected from the patient’s page.
        </Notice>
      ) : null}
      {!isOver && data.patient.isAdult === true ? (
        <Notice tone="wait" title="To read only">
          {amend === null
            ? 'An RT or a physician of this unit records the screen.'
            : 'Only its author or a physician can correct this screen.'}
        </Notice>
      ) : null}
      <EarlierScreens form={data} />
    </StepPage>
  )
}

function ScreenForm({ initial, live, isStale }: { initial: ScreenFormDto; live: ScreenFormDto; isStale: boolean }) {
  const router = useRouter()
  const nowMs = useServerNow(live.nowMs)
  const { form, verdict, counted, carried, unconfirmed, confirm, isExcusing, setExcusing } = useScreenForm(initial)
  const [isAskingToConfirm, setAskingToConfirm] = useState(false)
  const confirmButton = useRef<HTMLButtonElement>(null)
  const element = useRef<HTMLDivElement>(null)
  const { patientId, episodeId, timeZone } = initial.patient
  const submit = useSubmit({
    form,
    path: `/api/episodes/${episodeId}/screens`,
    onRecorded: () => {
      form.reset(form.getValues())
      router.push(`/patients/${patientId}`)
    },
    invalidates: [todayKeys.root, patientKeys.root],
  })
  const send = () => element.current?.querySelector('form')?.requestSubmit()
  const onSubmit = (event: FormEvent<HTMLFormElement>) => {
    if (!isExcusing && unconfirmed.length > 0 && !isAskingToConfirm) {
      event.preventDefault()
      setAskingToConfirm(true)
      setTimeout(() => confirmButton.current?.focus(), 0)
      return
    }
    submit.onSubmit(event)
  }
  const confirmAll = () => {
    confirm(unconfirmed)
    setAskingToConfirm(false)
  }
  const newer = live.seenLatestId !== initial.seenLatestId ? live.screens[0] : undefined

  return (
    <StepPage title={initial.amending ? 'Correct the screen' : 'Daily screen'} form={initial} isStale={isStale}>
      <UnsavedGuard isDirty={form.formState.isDirty} />
      <AmendPanel form={form} entry={initial.amending} timeZone={timeZone} nowMs={nowMs} />
      {newer ? (
        <Notice tone="wait" title="Another screen was just recorded" role="status" className="mb-4">
          By {newer.recordedByName}. You can look at it on the patient’s page, or record yours as well.
        </Notice>
      ) : null}
      <div ref={element}>
        <Form submit={{ onSubmit }} label="Daily screen">
          {isExcusing ? (
            <ExcuseFields control={form.control} />
          ) : (
            <>
              <div className="z-10 -mx-2 tablet:sticky tablet:top-0 mb-1 flex flex-wrap items-end justify-between gap-x-6 gap-y-2 bg-paper px-2 py-3">
                {unconfirmed.length > 1 ? (
                  <Button onClick={confirmAll}>Confirm all {unconfirmed.length} carried-over values</Button>
                ) : (
                  <span />
                )}
                <VerdictPanel verdict={verdict} unconfirmedCount={unconfirmed.length} />
              </div>
              <CriteriaList
                form={form}
                rules={initial.protocol.content.screen}
                verdict={verdict}
                counted={counted}
                carried={carried}
                confirm={confirm}
                timeZone={timeZone}
                nowMs={nowMs}
                isAdult={initial.patient.isAdult}
              />
            </>
          )}
          <div className="mt-5 flex flex-col gap-5">
            <ObservedField control={form.control} name="observed" timeZone={timeZone} nowMs={nowMs} />
            {isAskingToConfirm && unconfirmed.length > 0 ? (
              <Notice tone="stop" role="alert" title={`${unconfirmed.length} carried over, not confirmed`}>
                <p>They count as not assessed until you confirm them.</p>
                <div className="mt-2 flex flex-wrap gap-3">
                  <button
                    ref={confirmButton}
                    type="button"
                    className="min-h-[44px] rounded-control border border-ink px-5 font-semibold"
                    onClick={confirmAll}
                  >
                    Confirm them all
                  </button>
                  <Button type="submit" variant="quiet">
                    Record them as not assessed
                  </Button>
                </div>
              </Notice>
            ) : null}
            <FormErrorSummary control={form.control} submit={submit} />
            <div className="flex flex-wrap gap-3">
              <SubmitButton isSending={submit.isSending}>{submitWords(isExcusing, initial.amending !== null)}</SubmitButton>
              <Button onClick={() => setExcusing(!isExcusing)}>
                {isExcusing ? 'Back to the criteria' : 'Excuse from the screen today'}
              </Button>
            </div>
          </div>
        </Form>
      </div>
      <ConflictDialog
        failure={submit.failure}
        patientId={patientId}
        what="screen"
        onRecordAnyway={
          initial.amending
            ? undefined
            : () => {
                form.setValue('recordAnyway', true)
                send()
              }
        }
      />
      <EarlierScreens form={live} />
    </StepPage>
  )
}

function submitWords(isExcusing: boolean, isAmending: boolean): string {
  if (isAmending) return 'Record correction'
  return isExcusing ? 'Record as excused today' : 'Record screen'
}
