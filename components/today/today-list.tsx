'use client'

import { useId, useState, type ReactNode } from 'react'
import { TrackLegend } from '@/components/day-track/track-legend'
import { Notice } from '@/components/ui/notice'
import { mayInUnit, STEP_ACTIONS, type Membership } from '@/lib/access/policy'
import { writeCookie } from '@/lib/client/cookie'
import type { TodayDto, TodayRowDto } from '@/lib/schemas/today'
import { AxisHeader } from './axis-header'
import { EmptyUnit } from './empty-unit'
import { GROUP_WORDS, groupOf, groupRows } from './group-rows'
import { moveTitle } from './row-words'
import { TodayRow } from './today-row'
import { TodaySentence } from './today-sentence'
import { useChanges } from './use-changes'
import { useHiddenNames } from './use-hidden-names'
import { useToday } from './use-today'
import { ViewSwitches, type Order } from './view-switches'

const MINUTE_MS = 60_000

type TodayListProps = { first: TodayDto; memberships: readonly Membership[]; orderAtFirst: Order; areNamesHiddenAtFirst: boolean }

/** The unit's working page: where it stands, and every patient with the next move. Keeps itself up to date. */
export function TodayList({ first, memberships, orderAtFirst, areNamesHiddenAtFirst }: TodayListProps) {
  const { today, isSilent } = useToday(first)
  const { unit } = today
  const names = useHiddenNames(areNamesHiddenAtFirst)
  const [order, setOrder] = useState(orderAtFirst)
  const minuteMs = Math.floor(today.nowMs / MINUTE_MS) * MINUTE_MS
  const changes = useChanges(today, moveTitle)
  const roles = memberships.filter((held) => held.unitId === unit.id).map((held) => held.role)
  const axis = { fromMs: today.trackFromMs, toMs: today.trackToMs }

  const drawRow = (row: TodayRowDto) => (
    <TodayRow
      key={row.patientId}
      row={row}
      isYours={groupOf(row, roles) === 'yours'}
      mayMove={row.move.kind === 'move' && mayInUnit(memberships, STEP_ACTIONS[row.move.step], unit.id)}
      isNameHidden={names.isHidden}
      fromMs={axis.fromMs}
      toMs={axis.toMs}
      timeZone={unit.timeZone}
      nowMs={minuteMs}
      changeCount={changes.counts[row.patientId] ?? 0}
    />
  )

  return (
    <>
      <div className="flex flex-wrap items-end justify-between gap-x-8 gap-y-2">
        <div>
          <h1 className="text-2xl font-bold tracking-tight tablet:text-3xl">Today</h1>
          <TodaySentence counts={today.counts} />
        </div>
        <ViewSwitches
          order={order}
          onOrder={(next) => {
            setOrder(next)
            writeCookie('daybreath-order', next)
          }}
          isNameHidden={names.isHidden}
          onNameHidden={names.setHidden}
        />
      </div>
      <div role="status">
        {isSilent ? (
          <Notice tone="stop" title="Not live" className="mt-3">
            The server has not answered for more than 15 seconds. What stands here may be out of date; it goes on by itself when
            the server answers.
          </Notice>
        ) : null}
      </div>
      <p role="status" className="sr-only">
        {changes.announcement}
      </p>
      {today.rows.length === 0 ? (
        <EmptyUnit unitId={unit.id} mayAdmit={mayInUnit(memberships, 'patient.admit', unit.id)} />
      ) : (
        <>
          <AxisHeader axis={axis} timeZone={unit.timeZone} />
          {order === 'bed' ? (
            <RowList title={`By bed · ${today.rows.length}`}>{today.rows.map(drawRow)}</RowList>
          ) : (
            groupRows(today.rows, roles).map(({ group, rows }) => (
              <RowList key={group} title={`${GROUP_WORDS[group]} · ${rows.length}`}>
                {rows.map(drawRow)}
              </RowList>
            ))
          )}
          {order === 'bed' && today.emptyBeds.length > 0 ? (
            <p className="mt-4 border-t border-line pt-3 text-muted">
              Nobody ventilated in <span className="figure">{today.emptyBeds.join(', ')}</span>
            </p>
          ) : null}
          <div className="mt-8">
            <TrackLegend />
          </div>
        </>
      )}
    </>
  )
}

function RowList({ title, children }: { title: string; children: ReactNode }) {
  const id = useId()
  return (
    <section aria-labelledby={id} className="mt-5">
      <h2 id={id} className="border-b border-line pb-1.5 pl-[15px] text-sm font-bold text-muted">
        {title}
      </h2>
      <ul>{children}</ul>
    </section>
  )
}
