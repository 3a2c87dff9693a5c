'use client'

import { useState } from 'react'
import { AdultsOnly } from '@/components/episodes/adults-only'
import { NextMoveLine } from '@/components/episodes/next-move-line'
import { StepPage } from '@/components/episodes/step-page'
import { useLive } from '@/components/episodes/use-live'
import { useServerNow } from '@/components/episodes/use-server-now'
import { Button } from '@/components/ui/button'
import { Notice } from '@/components/ui/notice'
import { stepKeys } from '@/lib/client/keys/steps'
import type { DecisionFormDto } from '@/lib/schemas/decisions'
import { DecisionForm } from './decision-form'
import { Evidence } from './evidence'
import { MissingEvidence } from './missing-evidence'
import { SignedDecision } from './signed-decision'

/**
 * The page of the decision. The evidence stands still while somebody reads and signs: when the record changes meanwhile the page says so and
 * shows the new state only when asked to.
 */
export function DecisionPage({ initial, amend }: { initial: DecisionFormDto; amend: string | null }) {
  const { episodeId, patientId, timeZone } = initial.patient
  const path = `/api/episodes/${episodeId}/decisions${amend ? `?amend=${encodeURIComponent(amend)}` : ''}`
  const { data, isStale, readAgain } = useLive(stepKeys.form('decision', episodeId, amend), path, initial)
  const nowMs = useServerNow(data.nowMs)
  const [shown, setShown] = useState(initial)
  const [isDeciding, setDeciding] = useState(false)
  const isOver = data.patient.episodeEndedAt !== null
  const maySign = data.may.sign && !isOver
  const isOwed = data.move.kind === 'move' && (data.move.step === 'decide' || data.move.step === 'decide_again')
  const showsForm = maySign && (amend !== null || data.decisions.length === 0 || isOwed || isDeciding)
  const isEvidenceChanged = data.evidenceHash !== shown.evidenceHash || data.seenLatestId !== shown.seenLatestId
  const dto = showsForm ? shown : data
  return (
    <StepPage title={initial.amending ? 'Correct the decision' : 'Decision'} form={data} isStale={isStale}>
      <AdultsOnly isAdult={data.patient.isAdult} patientId={patientId} mayCorrect />
      {data.decisions.length > 0 && amend === null ? (
        <section className="mb-8" aria-labelledby="signed-today">
          <h2 id="signed-today" className="mb-2 text-lg font-bold">
            Signed today
          </h2>
          {data.decisions.map((decision) => (
            <SignedDecision
              key={decision.id}
              decision={decision}
              timeZone={timeZone}
              nowMs={nowMs}
              amendHref={maySign ? `/episodes/${episodeId}/decision?amend=${encodeURIComponent(decision.id)}` : null}
            />
          ))}
          {showsForm ? null : (
            <NextMoveLine
              label="What comes next"
              move={data.move}
              href={`/patients/${patientId}`}
              timeZone={timeZone}
              nowMs={nowMs}
            />
          )}
        </section>
      ) : null}
      <Evidence dto={dto} nowMs={nowMs} />
      <MissingEvidence missing={dto.missing} />
      <p className="mt-6 text-muted">Daybreath computes and keeps the record; the physician decides.</p>
      {showsForm ? (
        <DecisionForm
          dto={shown}
          isEvidenceChanged={isEvidenceChanged}
          nowMs={nowMs}
          onReadAgain={() => setShown(data)}
          onSigned={() => {
            setDeciding(false)
            setShown(data)
            readAgain()
          }}
        />
      ) : null}
      {maySign && !showsForm ? (
        <Button
          className="mt-6"
          onClick={() => {
            setShown(data)
            setDeciding(true)
          }}
        >
          Sign another decision
        </Button>
      ) : null}
      {!maySign ? (
        <Notice tone={isOver ? 'info' : 'wait'} title={isOver ? 'Ventilation has ended' : 'To read only'} className="mt-6">
          {isOver ? 'There is nothing left to decide.' : 'A physician of this unit signs the decision.'}
        </Notice>
      ) : null}
    </StepPage>
  )
}
