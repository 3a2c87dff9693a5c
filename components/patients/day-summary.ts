import { sentenceCase } from '@/lib/weaning/sentence-case'
import type { PatientDayDto, RecordedDto } from '@/lib/schemas/patient-page'
import {
  CRITERION_WORDS,
  DECISION_WORDS,
  EXCUSE_WORDS,
  HOLD_OUTCOME_WORDS,
  HOLD_SAFETY_WORDS,
  HOLD_START_WORDS,
  NOT_TODAY_WORDS,
  SCREEN_RESULT_WORDS,
  TRIAL_OUTCOME_WORDS,
} from '@/lib/weaning/words'
import { HOLD_SAFETY_ITEMS } from '@/lib/weaning/vocabulary'

/**
 * A ventilator day in four short sentences: latest screen, hold, trial and decision, each with its reasons. `all` are the days of the episode:
 * a hold or trial that ran past midnight has its end on the next one.
 */
export function daySummary(day: PatientDayDto, all: readonly PatientDayDto[]): { label: string; words: string }[] {
  const current = day.entries.filter(({ isWithdrawn }) => !isWithdrawn)
  const ends = all.flatMap(({ entries }) => entries).filter(({ isWithdrawn }) => !isWithdrawn)
  return [
    { label: 'Screen', words: screenWords(current) },
    { label: 'Hold', words: holdWords(current, ends) },
    { label: 'Trial', words: trialWords(current, ends) },
    { label: 'Decision', words: decisionWords(current) },
  ]
}

const because = (reasons: readonly string[]) => (reasons.length > 0 ? `: ${reasons.join(', ')}` : '')

function screenWords(entries: readonly RecordedDto[]): string {
  const screen = entries.find((one) => one.kind === 'screen')?.entry
  if (!screen) return 'Not recorded'
  const open = screen.result === 'not_ready' ? 'not_met' : 'not_assessed'
  const criteria =
    screen.verdict?.criteria.filter(({ mark }) => mark === open).map(({ criterion }) => CRITERION_WORDS[criterion]) ?? []
  return (
    sentenceCase(SCREEN_RESULT_WORDS[screen.result]) +
    because(screen.excuse ? [EXCUSE_WORDS[screen.excuse]] : screen.result === 'ready' ? [] : criteria)
  )
}

function holdWords(entries: readonly RecordedDto[], ends: readonly RecordedDto[]): string {
  const hold = entries.find((one) => one.kind === 'hold')?.entry
  if (!hold) return 'Not recorded'
  const unsafe = HOLD_SAFETY_ITEMS.filter((item) => hold.safety?.[item] === true).map((item) => HOLD_SAFETY_WORDS[item])
  if (hold.start !== 'started') return sentenceCase(HOLD_START_WORDS[hold.start]) + because(unsafe)
  const end = ends.find((one) => one.kind === 'hold_end' && one.entry.holdId === hold.entryId)
  if (end?.kind !== 'hold_end') return 'Running'
  return (
    sentenceCase(HOLD_OUTCOME_WORDS[end.entry.outcome]) +
    because(end.entry.outcome === 'tolerated' ? [] : [...end.entry.rulesMetWords, ...(end.entry.note ? [end.entry.note] : [])])
  )
}

function trialWords(entries: readonly RecordedDto[], ends: readonly RecordedDto[]): string {
  const trial = entries.find((one) => one.kind === 'trial')?.entry
  if (!trial) return 'Not recorded'
  const end = ends.find((one) => one.kind === 'trial_end' && one.entry.trialId === trial.entryId)
  if (end?.kind !== 'trial_end') return 'Running'
  return (
    sentenceCase(TRIAL_OUTCOME_WORDS[end.entry.outcome]) +
    because(end.entry.outcome === 'passed' ? [] : [...end.entry.rulesMetWords, ...(end.entry.reason ? [end.entry.reason] : [])])
  )
}

function decisionWords(entries: readonly RecordedDto[]): string {
  const decision = entries.find((one) => one.kind === 'decision')?.entry
  if (!decision) return 'Not recorded'
  return sentenceCase(DECISION_WORDS[decision.choice]) + because(decision.reasons.map((reason) => NOT_TODAY_WORDS[reason]))
}
