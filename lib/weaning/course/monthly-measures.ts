import { countScreens, type ReviewScreen, type ScreenCounts } from './count-screens'
import { countExtubations, type ExtubationCounts, type ReviewAirwayEvent } from './count-extubations'
import { countUnitDays, type ReviewEpisode, type ReviewStay } from './count-unit-days'
import { countTrials, type ReviewTrial, type TrialCounts } from './count-trials'

/**
 * A calendar day of the unit, yyyy-mm-dd, with the moments that bound it: 23 or 25 hours apart when the clocks change.
 * closesMs is the end of the screening window of the protocol in force that day.
 */
export type ReviewDay = { day: string; startMs: number; endMs: number; closesMs: number }

/** What the record holds of the patients who were in the unit. Current versions only, withdrawn ones left out. */
export type ReviewHistory = {
  unitId: string
  /** Consecutive, none after today. */
  days: ReviewDay[]
  nowMs: number
  /** Stays of these patients in every unit, since a day belongs to the unit where the patient was last. */
  stays: ReviewStay[]
  episodes: ReviewEpisode[]
  screens: ReviewScreen[]
  /** Trials that began in the unit. */
  trials: ReviewTrial[]
  /** Airway events of these patients in every unit. */
  airwayEvents: ReviewAirwayEvent[]
}

/** The counts of one month, yyyy-mm. Shares are made of these counts where they are shown, and are not computable over zero. */
export type MonthMeasures = {
  month: string
  /** The month that today belongs to: counted so far. */
  isUnfinished: boolean
  ventilatorDays: number
  patientDays: number
  screens: ScreenCounts
  trials: TrialCounts
  extubations: ExtubationCounts
}

/**
 * Counts a unit's months: ventilator days, patient days, screens, trials, extubations and reintubations.
 * Variant: a day counts for any part of it; the surveillance standard counts once a day.
 * @example monthlyMeasures({ unitId, days, nowMs, stays, episodes, screens, trials, airwayEvents })[0]?.ventilatorDays // 42
 */
export function monthlyMeasures(history: ReviewHistory): MonthMeasures[] {
  const months = [...new Set(history.days.map(({ day }) => day.slice(0, 7)))]
  const lastMonth = months.at(-1)
  const isTodayIn = history.days.some(({ startMs, endMs }) => startMs <= history.nowMs && history.nowMs < endMs)
  const unitDays = countUnitDays(history)
  const screens = countScreens(unitDays.ventilated, history.screens, history.episodes)
  const trials = countTrials(history.trials)
  const extubations = countExtubations(history.airwayEvents, history.unitId, history.nowMs)
  return months.map((month) => ({
    month,
    isUnfinished: isTodayIn && month === lastMonth,
    ventilatorDays: unitDays.ventilatorDays.get(month) ?? 0,
    patientDays: unitDays.patientDays.get(month) ?? 0,
    screens: screens.of(month),
    trials: trials.of(month),
    extubations: extubations.of(month),
  }))
}
