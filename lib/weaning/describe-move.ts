import type { MoveReason, MoveStep, NextMove, NoMoveReason } from './day-record'
import { CRITERION_WORDS, DECISION_WORDS, EPISODE_END_WORDS, EXCUSE_WORDS, HOLD_SAFETY_WORDS, ROLE_WORDS } from './words'

/** A move in plain words. `lateness` is null when nothing is late. */
export type MoveWords = { title: string; detail: string; lateness: string | null }
type FormatTime = (ms: number) => string
type Move = Extract<NextMove, { kind: 'move' }>

/** What each step is called. A limit that is met asks for the outcome to be recorded; it does not order one. */
export const STEP_WORDS: Record<MoveStep, string> = {
  screen: 'screen',
  complete_screen: 'complete screen',
  hold: 'start sedation hold',
  observe_hold: 'observe sedation hold',
  end_hold: 'record outcome of hold',
  start_trial: 'start trial',
  observe_trial: 'observe trial',
  end_trial: 'record outcome of trial',
  decide: 'decide',
  decide_again: 'look again and decide',
  extubate: 'extubate',
}

/**
 * The next move in plain words, for Today, the patient page and mail: whose move and what, why and by when, and how late it is. Times go through
 * `formatTime`; with `nowMs` the lateness is a duration, without it the time since when.
 * @example describeMove(move, formatTime, nowMs) // { title: 'RT · start trial', detail: 'pairing window closes 09:12', lateness: null }
 */
export function describeMove(move: NextMove, formatTime: FormatTime, nowMs?: number): MoveWords {
  if (move.kind === 'none') return { ...describeNone(move.reason, formatTime), lateness: null }
  const lateness = nowMs === undefined ? `overdue since ${formatTime(move.dueMs)}` : `${durationWords(nowMs - move.dueMs)} late`
  return {
    title: `${ROLE_WORDS[move.role]} · ${stepWords(move)}`,
    detail: describeWhy(move, formatTime),
    lateness: move.isOverdue ? lateness : null,
  }
}

function stepWords({ step, why }: Move): string {
  if (why.code === 'trial_observation') return `observation ${why.minute} min`
  if (why.code === 'decision_signed' && why.choice !== 'extubate') return DECISION_WORDS[why.choice]
  return STEP_WORDS[step]
}

function describeWhy({ why, dueMs, isOverdue }: Move, formatTime: FormatTime): string {
  const because = reasonWords(why, formatTime)
  if (because.hasDue) return because.words
  const due = `${isOverdue ? 'due' : 'by'} ${formatTime(dueMs)}`
  return because.words === '' ? due : `${because.words} · ${due}`
}

/** The reason, and whether the words already name the due time. */
function reasonWords(why: MoveReason, formatTime: FormatTime): { words: string; hasDue: boolean } {
  const open = (words: string) => ({ words, hasDue: false })
  const dated = (words: string) => ({ words, hasDue: true })
  switch (why.code) {
    case 'window_open':
    case 'trial_observation':
      return open('')
    case 'window_closed':
      return dated(`screening window closed ${formatTime(why.closedMs)}`)
    case 'not_assessed':
      return open(`${why.criteria.map((criterion) => CRITERION_WORDS[criterion]).join(', ')} not assessed`)
    case 'screen_ready':
      return open(`screen ready ${formatTime(why.atMs)}`)
    case 'pairing_window':
      return dated(`pairing window closes ${formatTime(why.closesMs)}`)
    case 'hold_not_needed':
      return open('no sedation hold needed')
    case 'hold_tolerated':
      return open(`hold tolerated ${formatTime(why.atMs)}`)
    case 'hold_running':
      return open(
        why.lastObservedMs === null ? `hold began ${formatTime(why.startedMs)}` : `last look ${formatTime(why.lastObservedMs)}`,
      )
    case 'hold_eyes_open':
      return open(`eyes open to voice ${formatTime(why.atMs)}`)
    case 'hold_limit_met':
    case 'trial_limit_met':
      return dated(`limit met: ${why.ruleWords.join('; ')}`)
    case 'hold_long_enough':
      return dated(`lasted long enough without failing at ${formatTime(why.sinceMs)}`)
    case 'trial_planned_end':
      return dated(`planned end ${formatTime(why.atMs)}${why.isLastLookMissing ? ' · last observation still due' : ''}`)
    case 'trial_was_stopped':
      return open(`last trial stopped ${formatTime(why.atMs)}`)
    case 'trial_passed':
      return open(`trial passed ${formatTime(why.atMs)}`)
    case 'look_again':
      return dated(`look again ${formatTime(why.atMs)}`)
    case 'decision_signed':
      return open(`signed ${formatTime(why.atMs)}`)
  }
}

function describeNone(reason: NoMoveReason, formatTime: FormatTime): { title: string; detail: string } {
  const none = (detail: string) => ({ title: 'No move today', detail })
  switch (reason.code) {
    case 'not_ready':
      return none(`screen not ready: ${reason.criteria.map((criterion) => CRITERION_WORDS[criterion]).join(', ')} not met`)
    case 'excused':
      return { title: 'Excused today', detail: EXCUSE_WORDS[reason.excuse] }
    case 'started_after_window':
      return none(`ventilation began ${formatTime(reason.startedMs)}, after the screening window`)
    case 'before_window':
      return { title: 'No move yet', detail: `screening window opens ${formatTime(reason.opensMs)}` }
    case 'hold_unsafe':
      return none(`sedation hold unsafe: ${reason.items.map((item) => HOLD_SAFETY_WORDS[item]).join(', ')}`)
    case 'hold_not_tolerated':
      return none(`sedation hold not tolerated ${formatTime(reason.atMs)}`)
    case 'hold_stopped':
      return none(`sedation hold stopped ${formatTime(reason.atMs)}`)
    case 'trial_failed':
      return none(
        [`trial failed ${formatTime(reason.atMs)}`, ...(reason.ruleWords.length > 0 ? [reason.ruleWords.join('; ')] : [])].join(
          ': ',
        ),
      )
    case 'look_again_later':
      return none(reason.atMs === null ? 'not today' : `not today, look again ${formatTime(reason.atMs)}`)
    case 'tracheostomy_pathway':
      return none('tracheostomy pathway')
    case 'episode_ended':
      return {
        title: 'Ventilation ended',
        detail: `${reason.end === null ? 'ended' : EPISODE_END_WORDS[reason.end]} ${formatTime(reason.atMs)}`,
      }
    case 'not_adult':
      return { title: 'Not computed', detail: 'under 18 years: the criteria are for adults' }
    case 'age_unknown':
      return { title: 'Birth date needed', detail: 'age unknown: nothing is computed until the birth date is recorded' }
  }
}

/** "4 min", "1 h 28 min", "2 d 3 h"; whole minutes, at least one. */
function durationWords(ms: number): string {
  const minutes = Math.max(1, Math.floor(ms / 60_000))
  const hours = Math.floor(minutes / 60)
  if (hours === 0) return `${minutes} min`
  if (hours < 48) return minutes % 60 === 0 ? `${hours} h` : `${hours} h ${minutes % 60} min`
  return `${Math.floor(hours / 24)} d ${hours % 24} h`
}
