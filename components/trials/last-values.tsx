import type { ReactNode } from 'react'
import { readingText } from '@/components/episodes/reading-label'
import { Mark, type MarkShape } from '@/components/ui/mark'
import { TONE_TEXT, type Tone } from '@/components/ui/tag'
import { LabelledValue } from '@/components/ui/value'
import { clockTime } from '@/lib/client/wall-clock'
import { cn } from '@/lib/shared/cn'
import type { JudgedRuleDto } from '@/lib/schemas/observation'
import type { TrialDto } from '@/lib/schemas/trials'
import { limitText, limitWords } from '@/lib/weaning/limit-words'
import type { ObservedReading, StopRule } from '@/lib/weaning/protocol'
import { lastObserved } from './last-observed'

type LastValuesProps = {
  trial: TrialDto
  rules: readonly StopRule[]
  predictedBodyWeightKg: number | null
  timeZone: string
  nowMs: number
}

/** The last values of a trial, large, each against its baseline and the limits that look at it. */
export function LastValues({ trial, rules, predictedBodyWeightKg, timeZone, nowMs }: LastValuesProps) {
  const age = (atMs: number | undefined) => (atMs === undefined ? '' : `at ${clockTime(atMs, timeZone, nowMs)}`)
  const number = (
    reading: 'breathsPerMin' | 'tidalVolumeMl' | 'spo2Percent' | 'heartRatePerMin',
    label: string,
    unit: string,
    extra?: ReactNode,
  ) => {
    const last = lastObserved(trial, reading)
    const before = trial.baseline[reading]
    return (
      <LabelledValue label={label} value={last ? readingText(reading, last.value) : null} unit={unit} missing="not observed yet">
        <Baseline text={before === null ? null : readingText(reading, before)} age={age(last?.atMs)} />
        {extra}
        <Limits reading={reading} rules={rules} judged={trial.rules} />
      </LabelledValue>
    )
  }
  const volume = lastObserved(trial, 'tidalVolumeMl')
  const rsbi = [...trial.observations].reverse().find((observation) => observation.rsbi !== null)
  const systolic = lastObserved(trial, 'systolicMmHg')
  const pressure = [...trial.observations].reverse().find(({ readings }) => readings.systolicMmHg !== null)?.readings
  return (
    <dl className="grid grid-cols-1 gap-x-6 gap-y-4 phone:grid-cols-2 tablet:grid-cols-3">
      {number('breathsPerMin', 'Respiratory rate', '/min')}
      {number(
        'tidalVolumeMl',
        'Tidal volume',
        'mL',
        volume && predictedBodyWeightKg ? (
          <p className="text-sm text-muted">{(volume.value / predictedBodyWeightKg).toFixed(1)} mL/kg PBW</p>
        ) : null,
      )}
      <LabelledValue
        label="RSBI"
        value={rsbi?.rsbi === undefined || rsbi.rsbi === null ? null : rsbi.rsbi.toFixed(1)}
        unit="/min/L"
        missing="not assessed"
      >
        <Baseline text={trial.baselineRsbi === null ? null : trial.baselineRsbi.toFixed(1)} age={age(rsbi?.observedAt)} />
        <p className="text-sm text-muted">
          {trial.technique === 't_piece' ? 'on T-piece, without support' : 'on support: reads lower than without'}
        </p>
        <Limits reading="rsbi" rules={rules} judged={trial.rules} />
      </LabelledValue>
      {number('spo2Percent', 'SpO2', '%')}
      {number('heartRatePerMin', 'Heart rate', '/min')}
      <LabelledValue
        label="Blood pressure"
        value={pressure ? pressureText(pressure) : null}
        unit="mmHg"
        missing="not observed yet"
      >
        <Baseline text={trial.baseline.systolicMmHg === null ? null : pressureText(trial.baseline)} age={age(systolic?.atMs)} />
        <Limits reading="systolicMmHg" rules={rules} judged={trial.rules} />
      </LabelledValue>
    </dl>
  )
}

function pressureText({ systolicMmHg, diastolicMmHg }: { systolicMmHg: number | null; diastolicMmHg: number | null }): string {
  return `${systolicMmHg ?? '–'}/${diastolicMmHg ?? '–'}`
}

function Baseline({ text, age }: { text: string | null; age: string }) {
  return (
    <p className="text-sm text-muted">{[age, text === null ? 'no baseline' : `baseline ${text}`].filter(Boolean).join(' · ')}</p>
  )
}

const LOOK: Record<JudgedRuleDto['state'], { shape: MarkShape; tone: Tone; word: string }> = {
  met: { shape: 'cross', tone: 'stop', word: 'met' },
  near: { shape: 'late', tone: 'dawn', word: 'exceeded, not yet long enough' },
  clear: { shape: 'tick', tone: 'calm', word: 'within' },
  unknown: { shape: 'ring', tone: 'wait', word: 'not judged' },
}

/** The limits of one reading, each with its state in a mark and a word. */
function Limits({
  reading,
  rules,
  judged,
}: {
  reading: ObservedReading
  rules: readonly StopRule[]
  judged: readonly JudgedRuleDto[]
}) {
  const own = rules.filter((rule) => (rule.kind === 'limit' || rule.kind === 'change') && rule.reading === reading)
  return own.map((rule) => {
    const look = LOOK[judged.find(({ id }) => id === rule.id)?.state ?? 'unknown']
    return (
      <p key={rule.id} className={cn('flex items-baseline gap-1.5 text-sm font-semibold', TONE_TEXT[look.tone])}>
        <Mark shape={look.shape} className="translate-y-[0.06em]" />
        <span>
          {shortRule(rule)} · {look.word}
        </span>
      </p>
    )
  })
}

/** "limit above 35 for 5 min", "limit up 20 % for 5 min": the rule beside its value, whose unit already stands there. */
export function shortRule(rule: StopRule): string {
  if (rule.kind !== 'limit' && rule.kind !== 'change') return ''
  const lasting = rule.sustainedMin > 0 ? ` for ${rule.sustainedMin} min` : ''
  if (rule.kind === 'limit') return `limit ${limitWords(rule.limit, rule.reading === 'ph' ? 2 : 0)}${lasting}`
  const by = `${rule.direction === 'rise' ? 'up' : 'down'} ${rule.comparator === 'above' ? 'more than ' : ''}${limitText(rule.by, 0)}${rule.as === 'percent' ? ' %' : ''}`
  return `limit ${by}${rule.comparator === 'atLeast' ? ' or more' : ''}${lasting}`
}
