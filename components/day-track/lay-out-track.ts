import type { DayTrackDto } from '@/lib/schemas/today'
import {
  DECISION_WORDS,
  HOLD_OUTCOME_WORDS,
  HOLD_START_WORDS,
  SCREEN_RESULT_WORDS,
  TRIAL_OUTCOME_WORDS,
} from '@/lib/weaning/words'
import {
  DECISION_LOOK,
  HOLD_OUTCOME_LOOK,
  HOLD_START_LOOK,
  SCREEN_LOOK,
  TRIAL_OUTCOME_LOOK,
  type Look,
} from '@/components/marks/looks'
import { percentAt, type Axis } from './axis'

export type PlacedMark = Look & { key: string; at: number; lane: 'above' | 'inBar' | 'afterBar' }
export type PlacedBar = {
  key: string
  kind: 'hold' | 'trial'
  from: number
  to: number
  isOpen: boolean
  look: Look | null
  dots: number[]
}
export type TrackLayout = {
  marks: PlacedMark[]
  bars: PlacedBar[]
  band: { from: number; to: number } | null
  /** What lies before or after the axis, in words with its time; shown on demand at that end. */
  earlier: string[]
  later: string[]
}

/** Places a day on the axis, in percent of its width. What lies outside is folded to its end, never dropped. */
export function layOutTrack(track: DayTrackDto, axis: Axis, nowMs: number, time: (ms: number) => string): TrackLayout {
  const layout: TrackLayout = { marks: [], bars: [], band: placeBand(track, axis), earlier: [], later: [] }
  for (const screen of track.screens) {
    placeMark(
      layout,
      axis,
      screen.atMs,
      { ...SCREEN_LOOK[screen.result], key: `s${screen.atMs}`, lane: 'above' },
      `${time(screen.atMs)} screen ${SCREEN_RESULT_WORDS[screen.result]}`,
    )
  }
  for (const hold of track.holds) placeHold(layout, axis, hold, nowMs, time)
  for (const trial of track.trials) placeTrial(layout, axis, trial, nowMs, time)
  for (const decision of track.decisions) {
    placeMark(
      layout,
      axis,
      decision.atMs,
      { ...DECISION_LOOK[decision.choice], key: `d${decision.atMs}`, lane: 'above' },
      `${time(decision.atMs)} decision: ${DECISION_WORDS[decision.choice]}`,
    )
  }
  return layout
}

function placeBand({ pairingWindow }: DayTrackDto, axis: Axis): TrackLayout['band'] {
  if (pairingWindow === null) return null
  const from = Math.max(0, percentAt(axis, pairingWindow.startMs))
  const to = Math.min(100, percentAt(axis, pairingWindow.endMs))
  return to > from ? { from, to } : null
}

function placeMark(layout: TrackLayout, axis: Axis, ms: number, mark: Omit<PlacedMark, 'at'>, words: string): void {
  const at = percentAt(axis, ms)
  if (at < 0) layout.earlier.push(words)
  else if (at > 100) layout.later.push(words)
  else layout.marks.push({ ...mark, at })
}

function placeHold(
  layout: TrackLayout,
  axis: Axis,
  hold: DayTrackDto['holds'][number],
  nowMs: number,
  time: (ms: number) => string,
): void {
  const key = `h${hold.startMs}`
  if (hold.start !== 'started') {
    placeMark(
      layout,
      axis,
      hold.startMs,
      { ...HOLD_START_LOOK[hold.start], key, lane: 'inBar' },
      `${time(hold.startMs)} sedation hold ${HOLD_START_WORDS[hold.start]}`,
    )
    return
  }
  const outcome =
    hold.outcome === null ? null : { look: HOLD_OUTCOME_LOOK[hold.outcome], words: HOLD_OUTCOME_WORDS[hold.outcome] }
  placeBar(layout, axis, { kind: 'hold', key, startMs: hold.startMs, endMs: hold.endMs, nowMs, outcome, dotsMs: [] }, time)
}

function placeTrial(
  layout: TrackLayout,
  axis: Axis,
  trial: DayTrackDto['trials'][number],
  nowMs: number,
  time: (ms: number) => string,
): void {
  const outcome =
    trial.outcome === null ? null : { look: TRIAL_OUTCOME_LOOK[trial.outcome], words: TRIAL_OUTCOME_WORDS[trial.outcome] }
  placeBar(
    layout,
    axis,
    {
      kind: 'trial',
      key: `t${trial.startMs}`,
      startMs: trial.startMs,
      endMs: trial.endMs,
      nowMs,
      outcome,
      dotsMs: trial.observationsMs,
    },
    time,
  )
}

type Bar = {
  kind: 'hold' | 'trial'
  key: string
  startMs: number
  endMs: number | null
  nowMs: number
  outcome: { look: Look; words: string } | null
  dotsMs: readonly number[]
}

function placeBar(layout: TrackLayout, axis: Axis, bar: Bar, time: (ms: number) => string): void {
  const name = bar.kind === 'hold' ? 'sedation hold' : 'breathing trial'
  const from = percentAt(axis, bar.startMs)
  const to = percentAt(axis, bar.endMs ?? Math.max(bar.nowMs, bar.startMs))
  const ending = bar.endMs === null || bar.outcome === null ? null : `${time(bar.endMs)} ${name} ${bar.outcome.words}`
  if (from < 0) layout.earlier.push(`${time(bar.startMs)} ${name} began`)
  if (from > 100) layout.later.push(`${time(bar.startMs)} ${name} began`)
  if (from <= 100 && to >= 0) {
    const dots = bar.dotsMs.map((ms) => percentAt(axis, ms)).filter((at) => at >= 0 && at <= 100)
    layout.bars.push({
      key: bar.key,
      kind: bar.kind,
      from: Math.max(0, from),
      to: Math.min(100, to),
      isOpen: bar.endMs === null,
      look: bar.outcome?.look ?? null,
      dots,
    })
  }
  if (ending === null || bar.outcome === null) return
  if (to < 0) layout.earlier.push(ending)
  else if (to > 100) layout.later.push(ending)
  else layout.marks.push({ ...bar.outcome.look, key: `${bar.key}end`, at: to, lane: bar.kind === 'hold' ? 'above' : 'afterBar' })
}
