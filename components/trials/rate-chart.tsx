import type { RunningTrialDto, TrialDto } from '@/lib/schemas/trials'
import { MINUTE_MS } from '@/lib/shared/time'
import type { StopRule } from '@/lib/weaning/protocol'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { describeRule } from '@/lib/weaning/stop/describe-rule'

type RateChartProps = {
  trial: TrialDto | RunningTrialDto
  rules: readonly StopRule[]
  /** The present, or the end of the trial; UTC ms. */
  untilMs: number
  isRunning: boolean
}

const HEIGHT = 190
type Point = { minute: number; rate: number }

/** Respiratory rate over the trial against the limits of the protocol. The table below it holds the same numbers. */
export function RateChart({ trial, rules, untilMs, isRunning }: RateChartProps) {
  const points = ratePoints(trial)
  const elapsedMin = Math.max(0, (untilMs - trial.observedAt) / MINUTE_MS)
  const lastMin = Math.max(trial.plannedDurationMin, elapsedMin, ...points.map(({ minute }) => minute)) * 1.03
  const limits = rules.filter((rule) => rule.kind === 'limit').filter((rule) => rule.reading === 'breathsPerMin')
  const highest = Math.max(45, ...limits.map(({ limit }) => limit.value + 8), ...points.map(({ rate }) => rate + 4))
  const x = (minute: number) => `${(100 * minute) / lastMin}%`
  const y = (rate: number) => HEIGHT - (HEIGHT * rate) / highest
  const last = points.at(-1)
  return (
    <figure className="m-0">
      <figcaption className="mb-2 font-semibold">Respiratory rate, /min, by minute of the trial</figcaption>
      <div className="relative pl-9">
        {[0, 10, 20, 30, 40]
          .filter((tick) => tick <= highest)
          .map((tick) => (
            <span
              key={tick}
              aria-hidden="true"
              className="figure absolute left-0 w-7 -translate-y-1/2 text-right text-sm text-muted"
              style={{ top: y(tick) }}
            >
              {tick}
            </span>
          ))}
        <svg width="100%" height={HEIGHT} role="img" aria-label={chartWords(points, limits)} className="overflow-visible">
          <line x1="0" x2="100%" y1={HEIGHT} y2={HEIGHT} className="stroke-line" strokeWidth="2" />
          {limits.map((rule) => (
            <LimitLine key={rule.id} rule={rule} y={y(rule.limit.value)} />
          ))}
          <line
            x1={x(trial.plannedDurationMin)}
            x2={x(trial.plannedDurationMin)}
            y1="0"
            y2={HEIGHT}
            className="stroke-muted"
            strokeDasharray="2 4"
          />
          {points.slice(1).map((point, index) => {
            const before = points[index]
            return before ? (
              <line
                key={point.minute}
                x1={x(before.minute)}
                y1={y(before.rate)}
                x2={x(point.minute)}
                y2={y(point.rate)}
                className="stroke-ink"
                strokeWidth="2.5"
              />
            ) : null
          })}
          {points.map((point) => (
            <circle
              key={point.minute}
              cx={x(point.minute)}
              cy={y(point.rate)}
              r="5.5"
              className="fill-paper stroke-ink"
              strokeWidth="2.5"
            />
          ))}
          {last ? (
            <text
              x={x(last.minute)}
              y={y(last.rate) - 12}
              textAnchor={last.minute > lastMin / 2 ? 'end' : 'start'}
              className="figure fill-ink text-sm font-semibold"
            >
              {last.rate}
            </text>
          ) : null}
          {isRunning ? (
            <line x1={x(elapsedMin)} x2={x(elapsedMin)} y1="-6" y2={HEIGHT + 4} className="stroke-dawn" strokeWidth="2.5" />
          ) : null}
        </svg>
        <div aria-hidden="true" className="relative h-6 text-sm text-muted">
          {minuteTicks(lastMin).map((tick) => (
            <span key={tick} className="figure absolute top-1 -translate-x-1/2 whitespace-nowrap" style={{ left: x(tick) }}>
              {tick}
              {tick === 0 ? ' min' : ''}
            </span>
          ))}
        </div>
      </div>
    </figure>
  )
}

function LimitLine({ rule, y }: { rule: Extract<StopRule, { kind: 'limit' }>; y: number }) {
  const isUpper = rule.limit.comparator === 'above' || rule.limit.comparator === 'atLeast'
  return (
    <>
      <line x1="0" x2="100%" y1={y} y2={y} className="stroke-stop" strokeWidth="1.5" strokeDasharray="6 4" />
      <text x="100%" y={isUpper ? y - 6 : y + 16} textAnchor="end" className="fill-muted text-xs">
        {isUpper ? 'over' : 'under'} {rule.limit.value}
        {rule.sustainedMin > 0 ? ` for ${rule.sustainedMin} min` : ''}
      </text>
    </>
  )
}

function minuteTicks(lastMin: number): number[] {
  const step = lastMin > 70 ? 30 : lastMin > 35 ? 15 : 10
  return Array.from({ length: Math.floor(lastMin / step) + 1 }, (_, index) => index * step)
}

/** Baseline at minute 0 and every observation that has a rate, by time. */
export function ratePoints(trial: TrialDto): Point[] {
  const baseline = trial.baseline.breathsPerMin
  const looks = trial.observations.flatMap(({ minute, readings }) =>
    readings.breathsPerMin === null ? [] : [{ minute, rate: readings.breathsPerMin }],
  )
  return baseline === null ? looks : [{ minute: 0, rate: baseline }, ...looks]
}

function chartWords(points: readonly Point[], limits: readonly StopRule[]): string {
  const values = points.map(({ minute, rate }) => `minute ${minute}: ${rate}`).join(', ')
  const rules = limits.map((rule) => sentenceCase(describeRule(rule))).join('. ')
  return `Respiratory rate per minute. ${values === '' ? 'No value yet' : values}. Stop rules: ${rules === '' ? 'none for the rate' : rules}.`
}
