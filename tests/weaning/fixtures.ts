import type { DayClock, DayDecision, DayHold, DayRecord, DayScreen, DayTrial } from '@/lib/weaning/day-record'
import type { ObservedReadings, ScreenReadings } from '@/lib/weaning/readings'
import type { Observation } from '@/lib/weaning/stop/observation'

/** A screen on which nothing was assessed. */
export const nothingScreened: ScreenReadings = {
  fio2Fraction: null,
  peepCmH2O: null,
  norepinephrineMcgPerKgMin: null,
  otherVasopressor: null,
  ischaemia: null,
  spo2Percent: null,
  paO2MmHg: null,
  paO2FiO2Fraction: null,
  ph: null,
  spontaneousEffort: null,
  cough: null,
  secretions: null,
  rass: null,
  raisedIcp: null,
  neuromuscularBlockade: null,
  temperatureC: null,
  haemoglobinGPerDl: null,
  causeImproving: null,
  breathsPerMin: null,
  tidalVolumeMl: null,
  rsbiCondition: null,
}

/** A worked screen (derived): P/F 215, f/VT 62. */
export const goodScreen: ScreenReadings = {
  fio2Fraction: 0.4,
  peepCmH2O: 5,
  norepinephrineMcgPerKgMin: 0,
  otherVasopressor: false,
  ischaemia: false,
  spo2Percent: 95,
  paO2MmHg: 86,
  paO2FiO2Fraction: 0.4,
  ph: 7.38,
  spontaneousEffort: true,
  cough: 'strong',
  secretions: 'scant',
  rass: 0,
  raisedIcp: false,
  neuromuscularBlockade: false,
  temperatureC: 37,
  haemoglobinGPerDl: 9,
  causeImproving: true,
  breathsPerMin: 24,
  tidalVolumeMl: 387,
  rsbiCondition: 'unsupported_one_minute',
}

/** A look at which nothing was observed. */
export const nothingObserved: ObservedReadings = {
  breathsPerMin: null,
  tidalVolumeMl: null,
  spo2Percent: null,
  heartRatePerMin: null,
  systolicMmHg: null,
  diastolicMmHg: null,
  rass: null,
  paCO2MmHg: null,
  paO2MmHg: null,
  ph: null,
  signs: [],
}

/** A look with these readings, the others not observed. */
export const look = (readings: Partial<ObservedReadings>): ObservedReadings => ({ ...nothingObserved, ...readings })

/** A look some minutes after the start. */
export const at = (minute: number, readings: Partial<ObservedReadings>): Observation => ({
  atMs: minute * 60_000,
  readings: look(readings),
})

/** 1 December 2026 in a zone without offset: "08:52" of that day in UTC milliseconds. */
export function clockMs(time: string, day = '2026-12-01'): number {
  return Date.parse(`${day}T${time}:00Z`)
}

export const TODAY = '2026-12-01'
export const YESTERDAY = '2026-11-30'

/** The clock of 1 December 2026 with the default window, at a time of that day. */
export function clockAt(time: string): DayClock {
  return {
    nowMs: clockMs(time),
    day: TODAY,
    previousDay: YESTERDAY,
    windowOpensMs: clockMs('05:00'),
    windowClosesMs: clockMs('09:00'),
    dayEndsMs: clockMs('00:00', '2026-12-02'),
  }
}

export const recordOf = (parts: Partial<DayRecord> = {}): DayRecord => ({
  episodeStartedMs: clockMs('10:00', '2026-11-28'),
  episodeEndedMs: null,
  episodeEnd: null,
  isAdult: true,
  screens: [],
  holds: [],
  trials: [],
  decisions: [],
  ...parts,
})

export const screenOf = (time: string, parts: Partial<DayScreen> = {}): DayScreen => ({
  ventilatorDay: TODAY,
  observedMs: clockMs(time, parts.ventilatorDay),
  result: 'ready',
  excuse: null,
  notMet: [],
  notAssessed: [],
  ...parts,
})

export const holdOf = (time: string, parts: Partial<DayHold> = {}): DayHold => ({
  ventilatorDay: TODAY,
  start: 'started',
  startedMs: clockMs(time, parts.ventilatorDay),
  unsafeBecause: [],
  lastObservedMs: null,
  failRulesMet: [],
  failRulesMetMs: null,
  opensEyesMs: null,
  endedMs: null,
  outcome: null,
  ...parts,
})

export const trialOf = (time: string, parts: Partial<DayTrial> = {}): DayTrial => ({
  ventilatorDay: TODAY,
  startedMs: clockMs(time, parts.ventilatorDay),
  plannedDurationMin: 30,
  observedMs: [],
  stopRulesMet: [],
  stopRulesMetMs: null,
  endedMs: null,
  outcome: null,
  ...parts,
})

export const decisionOf = (time: string, parts: Partial<DayDecision> = {}): DayDecision => ({
  ventilatorDay: TODAY,
  signedMs: clockMs(time, parts.ventilatorDay),
  choice: 'extubate',
  lookAgainMs: null,
  ...parts,
})
