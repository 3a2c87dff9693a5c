'use client'

import Link from 'next/link'
import { memo } from 'react'
import { DayTrack } from '@/components/day-track/day-track'
import { cn } from '@/lib/shared/cn'
import type { TodayRowDto } from '@/lib/schemas/today'
import { RowMove } from './row-move'
import { SettingsLine } from './settings-line'

export const ROW_GRID =
  'grid gap-x-4 grid-cols-[4.25rem_minmax(0,1fr)] tablet:grid-cols-[5rem_minmax(0,1fr)_minmax(0,17rem)] desk:grid-cols-[5rem_minmax(0,15.5rem)_minmax(0,1fr)_minmax(0,17.5rem)]'

type TodayRowProps = {
  row: TodayRowDto
  isYours: boolean
  mayMove: boolean
  isNameHidden: boolean
  /** Ends of the axis, UTC milliseconds. */
  fromMs: number
  toMs: number
  timeZone: string
  /** The present, to the minute: a row is drawn again only when something in it changes. */
  nowMs: number
  /** How often the row has changed; a new number replays the short highlight. */
  changeCount: number
}

/** One patient: bed, name, settings, day, next move. The name opens the patient, the move its form. */
export const TodayRow = memo(function TodayRow(props: TodayRowProps) {
  const { row, isYours, mayMove, isNameHidden, fromMs, toMs, timeZone, nowMs, changeCount } = props
  const name = `${row.familyName}, ${row.givenName}`
  return (
    <li className="relative border-t border-line first:border-t-0">
      <div key={changeCount} className={cn(ROW_GRID, 'items-center gap-y-1 py-2.5', changeCount > 0 && 'changed')}>
        <div
          className={cn('flex items-center self-stretch border-l-[5px] pl-2.5', isYours ? 'border-dawn' : 'border-transparent')}
        >
          <span className="figure text-xl font-semibold">
            <span className="sr-only">Bed </span>
            {row.bedLabel}
          </span>
        </div>
        <div className="min-w-0">
          {/* The link's area covers the row; what else can be pressed lies above it. */}
          <Link
            href={`/patients/${row.patientId}`}
            prefetch={false}
            className="inline-flex min-h-[24px] max-w-full items-center font-semibold text-ink no-underline after:absolute after:inset-0 hover:underline"
          >
            {isNameHidden ? (
              <span>
                <span className="font-normal text-muted">name hidden</span>
                <span className="sr-only">, bed {row.bedLabel}</span>
              </span>
            ) : (
              name
            )}
          </Link>
          <SettingsLine row={row} />
        </div>
        <div className="order-4 col-span-2 min-w-0 tablet:order-3 tablet:col-span-1 desk:order-4">
          <RowMove row={row} isYours={isYours} mayMove={mayMove} timeZone={timeZone} nowMs={nowMs} />
        </div>
        <div className="order-3 col-span-2 min-w-0 self-stretch tablet:order-4 tablet:col-span-3 desk:order-3 desk:col-span-1">
          <DayTrack track={row.track} axis={{ fromMs, toMs }} nowMs={nowMs} timeZone={timeZone} />
        </div>
      </div>
    </li>
  )
})
