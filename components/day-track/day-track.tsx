import { useId } from 'react'
import { MarkPath } from '@/components/ui/mark'
import { TONE_TEXT } from '@/components/ui/tag'
import { clockTime } from '@/lib/client/wall-clock'
import { cn } from '@/lib/shared/cn'
import type { DayTrackDto } from '@/lib/schemas/today'
import { axisHours, percentAt, type Axis } from './axis'
import { describeTrack } from './describe-track'
import { FoldedMark } from './folded-mark'
import { layOutTrack, type PlacedBar, type PlacedMark } from './lay-out-track'

const HEIGHT = 44
const BAR_TOP = 20
const BAR_HEIGHT = 14
const AXIS_Y = 39
const MARK_SIZE = 16

/** Space kept free at both ends, the same in every row, for what is folded there. Pixels. */
export const TRACK_GUTTER = 24

type DayTrackProps = { track: DayTrackDto; axis: Axis; nowMs: number; timeZone: string; className?: string }

/** One patient's ventilator day on the time axis that all rows share. Its text equivalent says the same in words. */
export function DayTrack({ track, axis, nowMs, timeZone, className }: DayTrackProps) {
  const hatchId = useId()
  const time = (ms: number) => clockTime(ms, timeZone, nowMs)
  const layout = layOutTrack(track, axis, nowMs, time)
  const now = percentAt(axis, nowMs)
  return (
    <div className={cn('relative flex h-full items-center', className)} style={{ paddingInline: TRACK_GUTTER }}>
      <svg
        role="img"
        aria-label={describeTrack(track, nowMs, time)}
        width="100%"
        height={HEIGHT}
        className="block overflow-visible"
      >
        <defs>
          <pattern id={hatchId} width="7" height="7" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
            <line x1="1" y1="0" x2="1" y2="7" stroke="currentColor" strokeWidth="1.6" />
          </pattern>
        </defs>
        {layout.band ? (
          <rect
            x={`${layout.band.from}%`}
            width={`${layout.band.to - layout.band.from}%`}
            y={BAR_TOP - 5}
            height={AXIS_Y - BAR_TOP + 5}
            className="fill-band"
          />
        ) : null}
        <line x1="0" x2="100%" y1={AXIS_Y} y2={AXIS_Y} className="stroke-line" strokeWidth="2" />
        {axisHours(axis, timeZone).map(({ ms }) => (
          <line
            key={ms}
            x1={`${percentAt(axis, ms)}%`}
            x2={`${percentAt(axis, ms)}%`}
            y1={AXIS_Y - 4}
            y2={AXIS_Y + 4}
            className="stroke-line"
            strokeWidth="1.5"
          />
        ))}
        {layout.bars.map((bar) => (
          <TrackBar key={bar.key} bar={bar} hatchId={hatchId} />
        ))}
        {layout.marks.map((mark) => (
          <TrackMark key={mark.key} mark={mark} />
        ))}
      </svg>
      {now >= 0 && now <= 100 ? (
        <span className="pointer-events-none absolute inset-y-0 block" style={{ insetInline: TRACK_GUTTER }}>
          <span className="absolute inset-y-0 -ml-px desk:-inset-y-2.5 block w-0.5 bg-dawn" style={{ left: `${now}%` }} />
        </span>
      ) : null}
      <FoldedMark side="earlier" items={layout.earlier} />
      <FoldedMark side="later" items={layout.later} />
    </div>
  )
}

/** Holds are hatched, trials solid with a dot for each observation; one that still runs is open at its right end. */
function TrackBar({ bar, hatchId }: { bar: PlacedBar; hatchId: string }) {
  const tone = bar.kind === 'hold' ? 'text-wait' : TONE_TEXT[bar.look?.tone ?? 'ink']
  const [x, width] = [`${bar.from}%`, `${Math.max(bar.to - bar.from, 0)}%`]
  const frame = { x, width, y: BAR_TOP, height: BAR_HEIGHT, stroke: 'currentColor', strokeWidth: 2 }
  return (
    <g className={tone}>
      <rect
        {...frame}
        fill={bar.kind === 'hold' ? `url(#${hatchId})` : 'currentColor'}
        strokeDasharray={bar.isOpen && bar.kind === 'hold' ? '3 2' : undefined}
      />
      {bar.dots.map((at) => (
        <circle key={at} cx={`${at}%`} cy={BAR_TOP + BAR_HEIGHT / 2} r="1.8" className="fill-paper" />
      ))}
    </g>
  )
}

function TrackMark({ mark }: { mark: PlacedMark }) {
  // A flag stands on its moment with its pole; a trial's outcome stands just after its bar; all else is centred.
  const shift = mark.lane === 'afterBar' ? 4 : mark.shape === 'flag' || mark.shape === 'flagOpen' ? -4 : -MARK_SIZE / 2
  const y = mark.lane === 'above' ? 0 : BAR_TOP - 1
  return (
    <svg x={`${mark.at}%`} y={y} width={MARK_SIZE} height={MARK_SIZE} overflow="visible" className={TONE_TEXT[mark.tone]}>
      <g transform={`translate(${shift} 0)`}>
        <MarkPath shape={mark.shape} />
      </g>
    </svg>
  )
}
