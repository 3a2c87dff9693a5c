'use client'

import { AdultsOnly } from '@/components/episodes/adults-only'
import { DueLine } from '@/components/episodes/due-line'
import { ElapsedClock } from '@/components/episodes/elapsed-clock'
import { StepPage } from '@/components/episodes/step-page'
import { useLive } from '@/components/episodes/use-live'
import { useServerNow } from '@/components/episodes/use-server-now'
import { Notice } from '@/components/ui/notice'
import { stepKeys } from '@/lib/client/keys/steps'
import { clockTime } from '@/lib/client/wall-clock'
import type { HoldFormDto } from '@/lib/schemas/holds'
import { SCREEN_RESULT_WORDS } from '@/lib/weaning/words'
import { EarlierHolds } from './earlier-holds'
import { HoldEndForm } from './hold-end-form'
import { HoldObservationForm } from './hold-observation-form'
import { HoldStartForm } from './hold-start-form'
import { RunningHold } from './running-hold'

/** The page of the sedation hold: its start, the running hold to leave open, corrections, and the day's earlier holds. */
export function HoldPage({ initial, amend }: { initial: HoldFormDto; amend: string | null }) {
  const { episodeId } = initial.patient
  const path = `/api/episodes/${episodeId}/holds${amend ? `?amend=${encodeURIComponent(amend)}` : ''}`
  const { data, isStale } = useLive(stepKeys.form('hold', episodeId, amend), path, initial)
  const nowMs = useServerNow(data.nowMs)
  const { running, patient } = data
  const { timeZone } = patient

  if (initial.amending) {
    return (
      <StepPage title="Correct the sedation hold" form={initial} isStale={isStale}>
        <Correction dto={initial} nowMs={nowMs} />
      </StepPage>
    )
  }
  if (running) {
    return (
      <StepPage
        title="Sedation hold"
        form={data}
        isStale={isStale}
        below={`Started ${clockTime(running.observedAt, timeZone, nowMs)} by ${running.recordedByName}`}
        aside={
          <ElapsedClock sinceMs={running.observedAt} nowMs={nowMs}>
            <DueLine what="Next observation" dueMs={running.nextObservationDueMs} nowMs={nowMs} timeZone={timeZone} />
          </ElapsedClock>
        }
      >
        <RunningHold dto={data} hold={running} nowMs={nowMs} />
      </StepPage>
    )
  }
  const mayStart = data.may.start && patient.isAdult === true && patient.episodeEndedAt === null
  return (
    <StepPage title="Sedation hold" form={data} isStale={isStale} below={screenWords(data, nowMs)}>
      <AdultsOnly isAdult={patient.isAdult} patientId={patient.patientId} mayCorrect />
      {mayStart ? <HoldStartForm dto={data} nowMs={nowMs} /> : <WhyNot dto={data} />}
      <EarlierHolds holds={data.holds} timeZone={timeZone} nowMs={nowMs} />
    </StepPage>
  )
}

function screenWords(dto: HoldFormDto, nowMs: number): string {
  const screen = dto.latestScreen
  if (!screen) return 'No screen recorded today'
  const words = SCREEN_RESULT_WORDS[screen.result]
  return `Screen ${clockTime(screen.observedAt, dto.patient.timeZone, nowMs)}: ${words}, by ${screen.recordedByName}`
}

function WhyNot({ dto }: { dto: HoldFormDto }) {
  if (dto.patient.isAdult !== true) return null
  if (dto.patient.episodeEndedAt !== null)
    return (
      <Notice tone="info" title="Ventilation has ended">
        No hold can be started any more.
      </Notice>
    )
  return (
    <Notice tone="wait" title="To read only">
      A nurse or a physician of this unit records the sedation hold.
    </Notice>
  )
}

function Correction({ dto, nowMs }: { dto: HoldFormDto; nowMs: number }) {
  const { amending } = dto
  if (amending?.kind === 'start') return <HoldStartForm dto={dto} nowMs={nowMs} />
  if (amending?.kind === 'observation')
    return <HoldObservationForm dto={dto} holdId={amending.holdId} amending={amending.observation} nowMs={nowMs} />
  if (amending?.kind === 'end')
    return <HoldEndForm dto={dto} holdId={amending.holdId} hold={null} amending={amending.end} nowMs={nowMs} />
  return null
}
