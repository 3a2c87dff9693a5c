import type { BedsideSign, Cough, HoldSafetyItem, Secretions } from './vocabulary'

/** One side of a limit. `atMost` and `atLeast` include the value, `below` and `above` do not: 105 passes "at most 105". */
export type Comparator = 'atMost' | 'below' | 'atLeast' | 'above'
export type Limit = { comparator: Comparator; value: number }

/** Criteria judged by number; the others by yes/no or by word. */
export type NumericCriterion =
  'fio2' | 'peep' | 'norepinephrine' | 'spo2' | 'pfRatio' | 'ph' | 'rass' | 'temperature' | 'haemoglobin' | 'rsbi'
export type YesNoCriterion =
  'otherVasopressor' | 'ischaemia' | 'spontaneousEffort' | 'raisedIcp' | 'neuromuscularBlockade' | 'causeImproving'
export type WordCriterion = 'cough' | 'secretions'

/** A criterion that the unit has switched on. All listed criteria must be met for "ready". */
export type ScreenRule =
  | { kind: 'number'; criterion: NumericCriterion; limits: Limit[]; source: string }
  | { kind: 'yesNo'; criterion: YesNoCriterion; expect: boolean; source: string }
  | { kind: 'word'; criterion: WordCriterion; accept: (Cough | Secretions)[]; source: string }

/** What a trial or hold observation can hold a number for. */
export const OBSERVED_READINGS = [
  'breathsPerMin',
  'tidalVolumeMl',
  'rsbi',
  'spo2Percent',
  'heartRatePerMin',
  'systolicMmHg',
  'paCO2MmHg',
  'paO2MmHg',
  'ph',
] as const
export type ObservedReading = (typeof OBSERVED_READINGS)[number]

/**
 * A reason to stop a trial or to end a hold.
 * limit: a value beyond a fixed limit, for at least sustainedMin (0 = a single reading is enough).
 * change: rise or fall from baseline, in percent or in the reading's own unit.
 * sign: one bedside sign is enough, at every look for sustainedMin when that is given. signs: a number of signs (and of limits that count as one) together.
 */
export type StopRule =
  | { kind: 'limit'; id: string; reading: ObservedReading; limit: Limit; sustainedMin: number; source: string }
  | {
      kind: 'change'
      id: string
      reading: ObservedReading
      direction: 'rise' | 'fall'
      comparator: 'atLeast' | 'above'
      by: number
      as: 'percent' | 'absolute'
      sustainedMin: number
      source: string
    }
  | { kind: 'sign'; id: string; sign: BedsideSign; sustainedMin?: number; source: string }
  | {
      kind: 'signs'
      id: string
      atLeast: number
      signs: BedsideSign[]
      limits: { reading: ObservedReading; limit: Limit }[]
      source: string
    }

/** Everything a unit's protocol decides. Kept whole in each protocol version, so that a past verdict can be re-read. */
export type ProtocolContent = {
  /** Minutes after local midnight. */
  screeningWindow: { opensMin: number; closesMin: number }
  screen: ScreenRule[]
  hold: {
    safetyItems: HoldSafetyItem[]
    failRules: StopRule[]
    /** Nurse's move after a "ready" screen is due this long after it. */
    startWithinMin: number
    observeEveryMin: number
    /** A hold that lasts this long without failing counts as tolerated. */
    toleratedAfterMin: number
    restartFraction: number
  }
  trial: {
    stopRules: StopRule[]
    defaultDurationMin: number
    shortestMin: number
    longestMin: number
    /** Minutes after the start at which an observation is due. */
    observationMinutes: number[]
    /** RT's move after a tolerated (or not needed) hold is due this long after it, or when the pairing window closes if later. */
    startWithinMin: number
    /** After a trial stopped for another reason, it is due again this long after. */
    retryWithinMin: number
  }
  /** Runs from the start of the hold. Hold and trial within 2 h of each other: PMID 37413692. */
  pairingWindowMin: number
  decision: { answerWithinMin: number; extubateWithinMin: number }
  watch: { hours: number[] }
}
