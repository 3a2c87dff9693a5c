import type {
  ClinicalRole,
  DecisionChoice,
  EpisodeEnd,
  ExcuseReason,
  HoldOutcome,
  HoldSafetyItem,
  HoldStart,
  ScreenCriterion,
  ScreenResult,
  TrialOutcome,
} from './vocabulary'

/** What has been recorded of one episode, current versions only, withdrawn ones left out, each list by time observed. */
export type DayRecord = {
  episodeStartedMs: number
  episodeEndedMs: number | null
  episodeEnd: EpisodeEnd | null
  /** false under 18, null when the age is unknown: then no move is computed. */
  isAdult: boolean | null
  screens: DayScreen[]
  holds: DayHold[]
  trials: DayTrial[]
  decisions: DayDecision[]
}
export type DayScreen = {
  ventilatorDay: string
  observedMs: number
  result: ScreenResult
  excuse: ExcuseReason | null
  notMet: ScreenCriterion[]
  notAssessed: ScreenCriterion[]
}
export type DayHold = {
  ventilatorDay: string
  start: HoldStart
  startedMs: number
  unsafeBecause: HoldSafetyItem[]
  lastObservedMs: number | null
  /** Fail rules already met by the observations so far, and when the first of them was. */
  failRulesMet: string[]
  failRulesMetMs: number | null
  /** First observation at which the patient opened the eyes to voice. */
  opensEyesMs: number | null
  endedMs: number | null
  outcome: HoldOutcome | null
}
export type DayTrial = {
  ventilatorDay: string
  startedMs: number
  plannedDurationMin: number
  observedMs: number[]
  /** Stop rules already met by the observations so far, and when the first of them was; of an ended trial, those recorded with its end. */
  stopRulesMet: string[]
  stopRulesMetMs: number | null
  endedMs: number | null
  outcome: TrialOutcome | null
}
export type DayDecision = {
  ventilatorDay: string
  signedMs: number
  choice: DecisionChoice
  lookAgainMs: number | null
}

/**
 * Where "now" stands in the unit's day. The caller computes it in the unit's time zone (lib/shared/time): day = localDay(now),
 * windowOpensMs = wallClockMs(day, screeningWindow.opensMin), likewise closes, dayEndsMs = wallClockMs(next day, 0).
 */
export type DayClock = {
  nowMs: number
  day: string
  previousDay: string
  windowOpensMs: number
  windowClosesMs: number
  dayEndsMs: number
}

export type MoveStep =
  | 'screen'
  | 'complete_screen'
  | 'hold'
  | 'observe_hold'
  | 'end_hold'
  | 'start_trial'
  | 'observe_trial'
  | 'end_trial'
  | 'decide'
  | 'decide_again'
  | 'extubate'

export type MoveReason =
  | { code: 'window_open'; closesMs: number }
  | { code: 'window_closed'; closedMs: number }
  | { code: 'not_assessed'; criteria: ScreenCriterion[] }
  | { code: 'screen_ready'; atMs: number }
  | { code: 'pairing_window'; closesMs: number }
  | { code: 'hold_not_needed'; atMs: number }
  | { code: 'hold_running'; startedMs: number; lastObservedMs: number | null }
  | { code: 'hold_tolerated'; atMs: number }
  | { code: 'hold_limit_met'; rules: string[]; ruleWords: string[] }
  | { code: 'hold_eyes_open'; atMs: number }
  | { code: 'hold_long_enough'; sinceMs: number }
  | { code: 'trial_observation'; minute: number }
  | { code: 'trial_limit_met'; rules: string[]; ruleWords: string[] }
  | { code: 'trial_planned_end'; atMs: number; isLastLookMissing: boolean }
  | { code: 'trial_was_stopped'; atMs: number }
  | { code: 'trial_passed'; atMs: number }
  | { code: 'look_again'; atMs: number }
  | { code: 'decision_signed'; atMs: number; choice: DecisionChoice }

export type NoMoveReason =
  | { code: 'not_ready'; criteria: ScreenCriterion[] }
  | { code: 'excused'; excuse: ExcuseReason }
  | { code: 'started_after_window'; startedMs: number }
  | { code: 'before_window'; opensMs: number }
  | { code: 'hold_unsafe'; items: HoldSafetyItem[] }
  | { code: 'hold_not_tolerated'; atMs: number }
  | { code: 'hold_stopped'; atMs: number }
  | { code: 'trial_failed'; atMs: number; rules: string[]; ruleWords: string[] }
  | { code: 'look_again_later'; atMs: number | null }
  | { code: 'tracheostomy_pathway' }
  | { code: 'episode_ended'; end: EpisodeEnd | null; atMs: number }
  | { code: 'not_adult' }
  | { code: 'age_unknown' }

/** The next thing somebody owes a patient, or the stated reason why nobody owes one today. */
export type NextMove =
  | { kind: 'move'; step: MoveStep; role: ClinicalRole; sinceMs: number; dueMs: number; isOverdue: boolean; why: MoveReason }
  | { kind: 'none'; reason: NoMoveReason }
