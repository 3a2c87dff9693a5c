'use client'

import { useState } from 'react'
import { ObservationTable } from '@/components/episodes/observation-table'
import { RuleStates } from '@/components/episodes/rule-states'
import { Button } from '@/components/ui/button'
import { Notice } from '@/components/ui/notice'
import type { RunningTrialDto, TrialFormDto } from '@/lib/schemas/trials'
import type { TrialOutcome } from '@/lib/weaning/vocabulary'
import { LastValues } from './last-values'
import { RateChart } from './rate-chart'
import { TrialEndForm } from './trial-end-form'
import { TrialObservationForm } from './trial-observation-form'

type Props = { dto: TrialFormDto; trial: RunningTrialDto; nowMs: number }

/** A running trial, to leave open: rate against its limits, last values against baseline, stop rules, the next observation, the end. */
export function RunningTrial({ dto, trial, nowMs }: Props) {
  const [ending, setEnding] = useState<TrialOutcome | null>(null)
  const { timeZone, predictedBodyWeightKg } = dto.patient
  const rules = dto.protocol.content.trial.stopRules
  const met = trial.rules.filter(({ state }) => state === 'met')
  return (
    <div className="flex flex-col gap-8">
      {met.length > 0 ? (
        <Notice tone="stop" title="A stop rule is met" role="alert">
          {met.map(({ words }) => words).join('; ')}. The clinician at the bedside decides.
        </Notice>
      ) : null}
      <RateChart trial={trial} rules={rules} untilMs={nowMs} isRunning />
      <LastValues trial={trial} rules={rules} predictedBodyWeightKg={predictedBodyWeightKg} timeZone={timeZone} nowMs={nowMs} />
      <RuleStates rules={trial.rules} title="Stop rules" timeZone={timeZone} nowMs={nowMs} />
      {ending === null && dto.may.observe ? (
        <TrialObservationForm dto={dto} trialId={trial.entryId} amending={null} nowMs={nowMs} />
      ) : null}
      {dto.may.end ? (
        ending === null ? (
          <section aria-labelledby="end-trial" className="border-t-2 border-ink pt-4">
            <h2 id="end-trial" className="mb-3 text-lg font-bold">
              End the trial
            </h2>
            <div className="flex flex-wrap gap-3">
              <Button onClick={() => setEnding('passed')}>Passed</Button>
              <Button onClick={() => setEnding('failed')}>Failed</Button>
              <Button onClick={() => setEnding('stopped')}>Stopped for another reason</Button>
            </div>
          </section>
        ) : (
          <TrialEndForm
            key={ending}
            dto={dto}
            trialId={trial.entryId}
            trial={trial}
            outcome={ending}
            amending={null}
            nowMs={nowMs}
            onBack={() => setEnding(null)}
          />
        )
      ) : null}
      <ObservationTable rows={trial.observations} caption="Observations of this trial" timeZone={timeZone} nowMs={nowMs} />
    </div>
  )
}
