'use client'

import { useId } from 'react'
import { Bar, CartesianGrid, Cell, ComposedChart, LabelList, Line, ResponsiveContainer, Tooltip, XAxis, YAxis } from 'recharts'
import type { ChartPoint, MeasureChartData } from './measure-series'

const INK = 'rgb(var(--ink))'
const MUTED = 'rgb(var(--muted))'
const LINE = 'rgb(var(--line))'
const FILLS = ['rgb(var(--calm))', 'rgb(var(--stop))'] as const
const DASHES = [undefined, '7 4'] as const
/** Below this a bar is too narrow for its number. */
const NARROWEST_LABELLED_PX = 17

type Row = ChartPoint & Record<string, unknown>

/** Months as bars or lines. Patterns and dashes tell series apart without colour; what is not final is hatched, or a hollow point. */
export function MeasureChart({ data }: { data: MeasureChartData }) {
  const id = useId().replace(/[^a-z0-9]/gi, '')
  const rows: Row[] = data.points.map((point) => ({ ...point, ...point.values }))
  const isLines = data.shape === 'lines'
  const ticks = ticksOf(data)
  return (
    <ResponsiveContainer width="100%" height={260} initialDimension={{ width: 560, height: 260 }}>
      <ComposedChart data={rows} margin={{ top: 22, right: isLines ? 92 : 8, bottom: 4, left: 4 }} accessibilityLayer={false}>
        <defs>
          {FILLS.map((fill, index) => (
            <pattern
              key={fill}
              id={`${id}-${index}`}
              width="6"
              height="6"
              patternUnits="userSpaceOnUse"
              patternTransform={`rotate(${index === 0 ? 45 : 135})`}
            >
              <rect width="6" height="6" fill="rgb(var(--paper))" />
              <rect width={index === 0 ? 2 : 3} height="6" fill={fill} />
            </pattern>
          ))}
        </defs>
        <CartesianGrid vertical={false} stroke={LINE} />
        <XAxis dataKey="label" tick={{ fill: MUTED, fontSize: 12 }} stroke={LINE} interval="preserveEnd" minTickGap={14} />
        <YAxis
          width={48}
          domain={[0, ticks.at(-1) ?? 1]}
          ticks={ticks}
          interval={0}
          tick={{ fill: MUTED, fontSize: 12 }}
          stroke={LINE}
          label={{ value: data.axis, position: 'top', offset: 10, dx: data.axis.length > 5 ? 12 : 0, fill: MUTED, fontSize: 12 }}
        />
        <Tooltip
          isAnimationActive={false}
          cursor={{ fill: 'rgb(var(--ink) / 0.06)' }}
          content={({ active, payload }) =>
            active ? <Reading data={data} row={payload[0]?.payload as Row | undefined} /> : null
          }
        />
        {data.series.map((series, index) =>
          isLines ? (
            <Line
              key={series.key}
              dataKey={series.key}
              name={series.heading}
              stroke={INK}
              strokeWidth={2}
              strokeDasharray={DASHES[index]}
              type="linear"
              isAnimationActive={false}
              connectNulls={false}
              dot={(dot: DotProps) => <Point key={dot.payload.month} {...dot} isSquare={index > 0} />}
            >
              <LabelList
                dataKey={series.key}
                content={(label) => (
                  <EndLabel
                    {...(label as LabelProps)}
                    isLast={label.index === lastKnown(rows, series.key)}
                    text={series.heading}
                  />
                )}
              />
            </Line>
          ) : (
            <Bar
              key={series.key}
              dataKey={series.key}
              name={series.heading}
              stackId={data.shape === 'stacked' ? 'all' : undefined}
              isAnimationActive={false}
              stroke={FILLS[index] ?? INK}
              maxBarSize={34}
            >
              {rows.map((row) => (
                <Cell
                  key={row.month}
                  fill={row.status === '' && index === 0 ? FILLS[0] : `url(#${id}-${index})`}
                  strokeDasharray={row.status === '' ? undefined : '3 2'}
                />
              ))}
              {data.shape === 'bars' ? (
                <LabelList dataKey={series.key} content={(label) => <BarLabel {...(label as LabelProps)} />} />
              ) : null}
            </Bar>
          ),
        )}
      </ComposedChart>
    </ResponsiveContainer>
  )
}

/** Ticks from zero upwards in round steps; shares go up to 100 % once they pass 40 %, ratios to 1. */
function ticksOf({ axis, points, series, shape }: MeasureChartData): number[] {
  if (axis === 'ratio') return [0, 0.25, 0.5, 0.75, 1]
  const heights = points.map(({ values }) => {
    const drawn = series.map(({ key }) => values[key] ?? 0)
    return shape === 'stacked' ? drawn.reduce((sum, value) => sum + value, 0) : Math.max(...drawn)
  })
  const highest = Math.max(1, ...heights)
  if (axis === '%' && highest > 40) return [0, 25, 50, 75, 100]
  const magnitude = 10 ** Math.floor(Math.log10(highest / 4))
  const step = Math.max(1, ([1, 2, 2.5, 5, 10].find((factor) => factor * magnitude * 4 >= highest) ?? 10) * magnitude)
  const count = Math.ceil(highest / step)
  return Array.from({ length: count + 1 }, (_, index) => index * step)
}

function lastKnown(rows: Row[], key: string): number {
  return rows.findLastIndex((row) => row.values[key] !== null && row.values[key] !== undefined)
}

type DotProps = { cx?: number; cy?: number; payload: Row }
type LabelProps = { x?: number; y?: number; width?: number; value?: number | null; index?: number }

function Point({ cx, cy, payload, isSquare }: DotProps & { isSquare: boolean }) {
  if (cx === undefined || cy === undefined || Number.isNaN(cy)) return <g />
  const fill = payload.status === '' ? INK : 'rgb(var(--paper))'
  return isSquare ? (
    <rect x={cx - 3.5} y={cy - 3.5} width={7} height={7} fill={fill} stroke={INK} strokeWidth={2} />
  ) : (
    <circle cx={cx} cy={cy} r={3.6} fill={fill} stroke={INK} strokeWidth={2} />
  )
}

function EndLabel({ x, y, isLast, text }: LabelProps & { isLast: boolean; text: string }) {
  if (!isLast || x === undefined || y === undefined) return <g />
  return (
    <text x={x + 9} y={y + 4} fill={INK} fontSize={12}>
      {text}
    </text>
  )
}

function BarLabel({ x, y, width, value }: LabelProps) {
  if (x === undefined || y === undefined || width === undefined || width < NARROWEST_LABELLED_PX || !value) return <g />
  return (
    <text x={x + width / 2} y={y - 5} fill={INK} fontSize={11} textAnchor="middle">
      {value}
    </text>
  )
}

function Reading({ data, row }: { data: MeasureChartData; row: Row | undefined }) {
  if (!row) return null
  return (
    <div className="rounded-control border border-line bg-paper px-3 py-2 text-sm text-ink">
      <p className="font-semibold">
        {row.label}
        {row.status === '' ? '' : `, ${row.status}`}
      </p>
      {data.series.map(({ key, heading, kind }) => {
        const value = row.values[key] ?? null
        return (
          <p key={key}>
            {heading}:{' '}
            {value === null
              ? 'not computable'
              : kind === 'percent'
                ? `${value.toFixed(1)} %`
                : kind === 'ratio'
                  ? value.toFixed(2)
                  : value}
          </p>
        )
      })}
    </div>
  )
}
