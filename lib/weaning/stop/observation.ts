import type { StopRule } from '@/lib/weaning/protocol'
import type { ObservedReadings } from '@/lib/weaning/readings'

/** One look at the patient during a hold or a trial. */
export type Observation = { atMs: number; readings: ObservedReadings }

/**
 * met: the rule has been met; it stays met until the observation itself is corrected.
 * near: beyond the limit at the last look but not yet long enough (reachedAtMs says when it would be), or some signs of the number that it takes.
 * clear: looked at, inside. unknown: nothing to judge by (no value, or no baseline for a change).
 */
export type StopState = 'met' | 'near' | 'clear' | 'unknown'

export type StopVerdict = {
  ruleId: string
  rule: StopRule
  state: StopState
  /** First look of the run beyond the limit that counts: the one that met the rule, or else the one that still runs. */
  sinceMs: number | null
  /** The look at which the rule was met. */
  metAtMs: number | null
  /** For a rule near its limit: when the run would be long enough. Only another look can meet it. */
  reachedAtMs: number | null
  /** Whether the last look that could judge the rule was beyond its limit. */
  isBeyondNow: boolean
  /** The last value looked at, unrounded: the reading, or the number of signs. */
  lastValue: number | null
  lastLookMs: number | null
}
