import type { DayTrackDto } from '@/lib/schemas/today'
import {
  DECISION_WORDS,
  HOLD_OUTCOME_WORDS,
  HOLD_START_WORDS,
  SCREEN_RESULT_WORDS,
  TRIAL_OUTCOME_WORDS,
} from '@/lib/weaning/words'

/** The day track in sentences, in order of time: what a screen reader reads in place of the drawing. */
export function describeTrack(track: DayTrackDto, nowMs: number, time: (ms: number) => string): string {
  const said: { ms: number; words: string }[] = []
  for (const { atMs, result } of track.screens)
    said.push({ ms: atMs, words: `Screen ${SCREEN_RESULT_WORDS[result]} at ${time(atMs)}.` })
  for (const hold of track.holds) said.push({ ms: hold.startMs, words: describeHold(hold, time) })
  for (const trial of track.trials) said.push({ ms: trial.startMs, words: describeTrial(trial, time) })
  for (const { atMs, choice } of track.decisions)
    said.push({ ms: atMs, words: `Decision at ${time(atMs)}: ${DECISION_WORDS[choice]}.` })
  const window = track.pairingWindow
  if (window !== null) {
    said.push({
      ms: window.endMs,
      words: `Pairing window ${window.endMs < nowMs ? 'closed' : 'closes'} at ${time(window.endMs)}.`,
    })
  }
  if (said.length === 0) return 'Nothing recorded yet today.'
  return said
    .sort((a, b) => a.ms - b.ms)
    .map(({ words }) => words)
    .join(' ')
}

function describeHold(hold: DayTrackDto['holds'][number], time: (ms: number) => string): string {
  if (hold.start !== 'started') return `Sedation hold ${HOLD_START_WORDS[hold.start]}, noted at ${time(hold.startMs)}.`
  if (hold.endMs === null) return `Sedation hold running since ${time(hold.startMs)}.`
  const outcome = hold.outcome === null ? '' : `, ${HOLD_OUTCOME_WORDS[hold.outcome]}`
  return `Sedation hold from ${time(hold.startMs)} to ${time(hold.endMs)}${outcome}.`
}

function describeTrial(trial: DayTrackDto['trials'][number], time: (ms: number) => string): string {
  const count = trial.observationsMs.length
  const observations = count === 1 ? '1 observation' : `${count} observations`
  if (trial.endMs === null) return `Breathing trial running since ${time(trial.startMs)}, ${observations}.`
  const outcome = trial.outcome === null ? '' : `, ${TRIAL_OUTCOME_WORDS[trial.outcome]}`
  return `Breathing trial from ${time(trial.startMs)} to ${time(trial.endMs)}, ${observations}${outcome}.`
}
