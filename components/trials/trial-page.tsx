'use client'

import { useState } from 'react'
import { AdultsOnly } from '@/components/episodes/adults-only'
import { DueLine } from '@/components/episodes/due-line'
import { ElapsedClock } from '@/components/episodes/elapsed-clock'
import { NextMoveLine } from '@/components/episodes/next-move-line'
import { StepPage } from '@/components/episodes/step-page'
import { useLive } from '@/components/episodes/use-live'
import { useServerNow } from '@/components/episodes/use-server-now'
import { Button } from '@/components/ui/button'
import { Notice } from '@/components/ui/notice'
import { stepKeys } from '@/lib/client/keys/steps'
import { clockTime } from '@/lib/client/wall-clock'
import type { RunningTrialDto, TrialFormDto } from '@/lib/schemas/trials'
import { formatDuration } from '@/lib/shared/format'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { EndedTrial } from './ended-trial'
import { RunningTrial } from './running-trial'
import { techniqueText } from './technique-text'
import { TrialEndForm } from './trial-end-form'
import { TrialObservationForm } from './trial-observation-form'
import { TrialStartForm } from './trial-start-form'

/** The page of the breathing trial: its start, the running trial to leave open, its outcome and what comes next, corrections. */
export function TrialPage({ initial, amend }: { initial: TrialFormDto; amend: string | null }) {
  const { episodeId } = initial.patient
  const path = `/api/episodes/${episodeId}/trials${amend ? `?amend=${encodeURIComponent(amend)}` : ''}`
  const { data, isStale } = useLive(stepKeys.form('trial', episodeId, amend), path, initial)
  const nowMs = useServerNow(data.nowMs)
  if (initial.amending) {
    return (
      <StepPage title="Correct the breathing trial" form={initial} isStale={isStale}>
        <Correction dto={initial} nowMs={nowMs} />
      </StepPage>
    )
  }
  const { running } = data
  if (running) {
    const { timeZone } = data.patient
    return (
      <StepPage
        title="Breathing trial"
        form={data}
        isStale={isStale}
        below={`${sentenceCase(techniqueText(running))}, planned ${running.plannedDurationMin} min, started ${clockTime(running.observedAt, timeZone, nowMs)}`}
        aside={
          <ElapsedClock sinceMs={running.observedAt} nowMs={nowMs}>
            <PlannedEnd trial={running} nowMs={nowMs} timeZone={timeZone} />
            {running.nextObservation ? (
              <p>
                <DueLine
                  what={`Observation ${running.nextObservation.minute} min`}
                  dueMs={running.nextObservation.dueMs}
                  nowMs={nowMs}
                  timeZone={timeZone}
                />
              </p>
            ) : null}
          </ElapsedClock>
        }
      >
        <RunningTrial dto={data} trial={running} nowMs={nowMs} />
      </StepPage>
    )
  }
  return <NoTrialRunning data={data} nowMs={nowMs} isStale={isStale} />
}

function PlannedEnd({ trial, nowMs, timeZone }: { trial: RunningTrialDto; nowMs: number; timeZone: string }) {
  const lateMs = nowMs - trial.plannedEndMs
  if (lateMs >= 60_000) return <p className="font-semibold text-stop">planned end passed by {formatDuration(lateMs)}</p>
  return <p className="text-muted">planned end {clockTime(trial.plannedEndMs, timeZone, nowMs)}</p>
}

function NoTrialRunning({ data, nowMs, isStale }: { data: TrialFormDto; nowMs: number; isStale: boolean }) {
  const [isStartingAnother, setStartingAnother] = useState(false)
  const { patient, trials, move } = data
  const isOver = patient.episodeEndedAt !== null
  const mayStart = data.may.start && patient.isAdult === true && !isOver
  const isOwed = move.kind === 'move' && move.step === 'start_trial'
  const showsForm = mayStart && (trials.length === 0 || isOwed || isStartingAnother)
  return (
    <StepPage title="Breathing trial" form={data} isStale={isStale}>
      <AdultsOnly isAdult={patient.isAdult} patientId={patient.patientId} mayCorrect />
      {trials.length > 0 && !showsForm ? (
        <NextMoveLine
          label="What comes next"
          move={move}
          href={`/patients/${patient.patientId}`}
          timeZone={patient.timeZone}
          nowMs={nowMs}
        />
      ) : null}
      {trials.length > 0 ? (
        <section className="my-6" aria-labelledby="trials-today">
          <h2 id="trials-today" className="mb-2 text-lg font-bold">
            Recorded today
          </h2>
          {trials.map((trial) => (
            <EndedTrial
              key={trial.id}
              trial={trial}
              rules={data.protocol.content.trial.stopRules}
              timeZone={patient.timeZone}
              nowMs={nowMs}
            />
          ))}
        </section>
      ) : null}
      {showsForm ? <TrialStartForm dto={data} nowMs={nowMs} /> : null}
      {mayStart && !showsForm ? <Button onClick={() => setStartingAnother(true)}>Start another trial</Button> : null}
      {!mayStart && patient.isAdult === true ? (
        <Notice tone={isOver ? 'info' : 'wait'} title={isOver ? 'Ventilation has ended' : 'To read only'}>
          {isOver ? 'No trial can be started any more.' : 'An RT or a physician of this unit starts and ends a trial.'}
        </Notice>
      ) : null}
    </StepPage>
  )
}

function Correction({ dto, nowMs }: { dto: TrialFormDto; nowMs: number }) {
  const { amending } = dto
  if (amending?.kind === 'start') return <TrialStartForm dto={dto} nowMs={nowMs} />
  if (amending?.kind === 'observation')
    return <TrialObservationForm dto={dto} trialId={amending.trialId} amending={amending.observation} nowMs={nowMs} />
  if (amending?.kind === 'end')
    return <TrialEndForm dto={dto} trialId={amending.trialId} trial={null} amending={amending.end} nowMs={nowMs} />
  return null
}
