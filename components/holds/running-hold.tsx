'use client'

import { useState } from 'react'
import { ObservationTable } from '@/components/episodes/observation-table'
import { RuleStates } from '@/components/episodes/rule-states'
import { Button } from '@/components/ui/button'
import { Notice } from '@/components/ui/notice'
import { clockTime } from '@/lib/client/wall-clock'
import type { HoldFormDto, RunningHoldDto } from '@/lib/schemas/holds'
import type { HoldOutcome } from '@/lib/weaning/vocabulary'
import { HoldEndForm } from './hold-end-form'
import { HoldObservationForm } from './hold-observation-form'
import { InfusionList } from './infusion-list'

type RunningHoldProps = { dto: HoldFormDto; hold: RunningHoldDto; nowMs: number }

/** A running hold: where it stands against its limits, the next observation, and its end. */
export function RunningHold({ dto, hold, nowMs }: RunningHoldProps) {
  const [ending, setEnding] = useState<HoldOutcome | null>(null)
  const { timeZone } = dto.patient
  return (
    <div className="flex flex-col gap-8">
      <div className="grid gap-8 desk:grid-cols-2">
        <div className="flex flex-col gap-4">
          <ToleranceLine hold={hold} nowMs={nowMs} timeZone={timeZone} />
          <RuleStates rules={hold.rules} title="What ends the hold" timeZone={timeZone} nowMs={nowMs} />
        </div>
        <InfusionList infusions={hold.infusions} />
      </div>
      {ending === null && dto.may.observe ? (
        <HoldObservationForm dto={dto} holdId={hold.entryId} amending={null} nowMs={nowMs} />
      ) : null}
      {dto.may.end ? (
        ending === null ? (
          <section aria-labelledby="end-hold" className="border-t-2 border-ink pt-4">
            <h2 id="end-hold" className="mb-3 text-lg font-bold">
              End the hold
            </h2>
            <div className="flex flex-wrap gap-3">
              <Button onClick={() => setEnding('tolerated')}>Tolerated</Button>
              <Button onClick={() => setEnding('not_tolerated')}>Not tolerated</Button>
              <Button onClick={() => setEnding('stopped')}>Stopped for another reason</Button>
            </div>
          </section>
        ) : (
          <HoldEndForm
            key={ending}
            dto={dto}
            holdId={hold.entryId}
            hold={hold}
            outcome={ending}
            amending={null}
            nowMs={nowMs}
            onBack={() => setEnding(null)}
          />
        )
      ) : null}
      <ObservationTable rows={hold.observations} caption="Observations of this hold" timeZone={timeZone} nowMs={nowMs} />
    </div>
  )
}

function ToleranceLine({ hold, nowMs, timeZone }: Pick<RunningHoldProps, 'hold' | 'nowMs'> & { timeZone: string }) {
  const byTime = clockTime(hold.toleratedByTimeAtMs, timeZone, nowMs)
  const eyes =
    hold.eyesOpenedAtMs === null
      ? 'Eyes opening to voice not recorded so far.'
      : `Eyes opened to voice at ${clockTime(hold.eyesOpenedAtMs, timeZone, nowMs)}.`
  if (hold.rules.some(({ state }) => state === 'met'))
    return (
      <Notice tone="stop" title="A limit that ends the hold is met" role="status">
        {eyes}
      </Notice>
    )
  if (hold.isTolerated)
    return (
      <Notice tone="calm" title="Counts as tolerated by the unit’s protocol" role="status">
        {eyes} No limit is met by what was observed.
      </Notice>
    )
  return (
    <Notice tone="info" title="Hold running">
      {eyes} It counts as tolerated when the eyes open to voice, or by duration at {byTime}, if no limit is met.
    </Notice>
  )
}
