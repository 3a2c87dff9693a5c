import type {
  DecisionChoice,
  ExcuseReason,
  HoldOutcome,
  HoldSafetyItem,
  NotTodayReason,
  SupportAfter,
  TrialOutcome,
} from '@/lib/weaning/vocabulary'

/** What happens in one patient's ventilator day. Moments in UTC milliseconds; an end of null is still to come. */
export type DayScript = {
  screen?:
    | { atMs: number; kind: 'readings' | 'incomplete' }
    | { atMs: number; kind: 'excused'; excuse: ExcuseReason; note: string | null }
  hold?: HoldScript
  trial?: TrialScript
  decision?: DecisionScript
}
export type HoldScript =
  | { kind: 'not_needed'; atMs: number }
  | { kind: 'unsafe'; atMs: number; item: HoldSafetyItem }
  | { kind: 'started'; startMs: number; lookMinutes: number[]; endMs: number | null; outcome: HoldOutcome | null }

export type TrialScript = {
  startMs: number
  plannedMin: number
  /** Minutes after the start at which somebody looked, each with how strained the patient was (1 is a respiratory rate over 35). */
  looks: { minute: number; strain: number; isDistressed?: boolean }[]
  endMs: number | null
  outcome: TrialOutcome | null
}
export type DecisionScript = {
  atMs: number
  choice: DecisionChoice
  reasons: NotTodayReason[]
  lookAgainMs: number | null
  supportAfter: SupportAfter | null
  note: string | null
}
