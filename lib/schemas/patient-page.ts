import type { NextMove } from '@/lib/weaning/day-record'
import type { ObservedReadings, Reading, ScreenReadings } from '@/lib/weaning/readings'
import type { ScreenVerdict } from '@/lib/weaning/screen/verdict'
import type {
  DecisionChoice,
  ExcuseReason,
  HoldOutcome,
  HoldSafetyItem,
  HoldStart,
  NotTodayReason,
  ScreenResult,
  SupportAfter,
  TrialOutcome,
  TrialTechnique,
} from '@/lib/weaning/vocabulary'
import type { AirwayEventDto } from './airway'
import type { EpisodeDto } from './episodes'
import type { GasDto } from './gases'
import type { EntryDto } from './observed'
import type { PatientActions, PatientHeadDto, StayDto } from './patients'
import type { SettingsDto } from './settings'
import type { DayTrackDto } from './today'

export type ScreenEntryDto = EntryDto & {
  result: ScreenResult
  excuse: ExcuseReason | null
  note: string | null
  readings: ScreenReadings | null
  verdict: ScreenVerdict | null
}
export type HoldEntryDto = EntryDto & {
  start: HoldStart
  safety: Partial<Record<HoldSafetyItem, boolean>> | null
  infusions: { drug: string; rate: number; unit: string; purpose: 'sedation' | 'pain' }[]
  note: string | null
}
export type HoldObservationEntryDto = EntryDto & {
  holdId: string
  readings: ObservedReadings
  opensEyesToVoice: 'yes' | 'no' | null
}
export type HoldEndEntryDto = EntryDto & {
  holdId: string
  outcome: HoldOutcome
  rulesMet: string[]
  /** The same in words of the protocol version that judged it. */
  rulesMetWords: string[]
  restarts: { drug: string; unit: string; rateBefore: number; rate: number }[]
  note: string | null
}
export type TrialEntryDto = EntryDto & {
  technique: TrialTechnique
  pressureSupportCmH2O: number | null
  peepCmH2O: number | null
  fio2Fraction: number
  plannedDurationMin: number
  baseline: ObservedReadings
  startedAnywayBecause: string | null
}
export type TrialObservationEntryDto = EntryDto & { trialId: string; readings: ObservedReadings }
export type TrialEndEntryDto = EntryDto & {
  trialId: string
  outcome: TrialOutcome
  rulesMet: string[]
  rulesMetWords: string[]
  returnedTo: string
  reason: string | null
}
export type DecisionEntryDto = EntryDto & {
  choice: DecisionChoice
  reasons: NotTodayReason[]
  note: string | null
  lookAgainAt: number | null
  supportAfter: SupportAfter | null
  steroidsPlanned: boolean | null
  contentHash: string
  statement: string
}

type Versions<Kind extends string, Entry> = {
  kind: Kind
  /** The current version. */
  entry: Entry
  /** Superseded versions, newest first; they stay readable. */
  earlier: Entry[]
  isWithdrawn: boolean
  mayAmend: boolean
}

/** One entry with all its versions. `mayAmend` says whether the reader may correct it (author or physician, and the role for it). */
export type RecordedDto =
  | Versions<'settings', SettingsDto>
  | Versions<'gas', GasDto>
  | Versions<'airway', AirwayEventDto>
  | Versions<'screen', ScreenEntryDto>
  | Versions<'hold', HoldEntryDto>
  | Versions<'hold_observation', HoldObservationEntryDto>
  | Versions<'hold_end', HoldEndEntryDto>
  | Versions<'trial', TrialEntryDto>
  | Versions<'trial_observation', TrialObservationEntryDto>
  | Versions<'trial_end', TrialEndEntryDto>
  | Versions<'decision', DecisionEntryDto>
export type RecordedKind = RecordedDto['kind']

/** One ventilator day: entries newest first. `dayNumber` counts from 1; null for what was recorded after ventilation ended. */
export type PatientDayDto = { day: string; dayNumber: number | null; entries: RecordedDto[] }

export type TrendsDto = {
  settings: {
    atMs: number
    fio2Fraction: number
    peepCmH2O: number
    ratePerMin: number | null
    tidalVolumeMl: number | null
    spo2Percent: number | null
    minuteVentilationLPerMin: number | null
  }[]
  /** From measured rate and volume, wherever both were recorded together. */
  rsbi: { atMs: number; value: number; from: 'screen' | 'trial' }[]
  gases: { atMs: number; ph: number; paCO2MmHg: number; paO2MmHg: number; pfRatio: number | null }[]
}

/**
 * Everything that the patient page shows, times in UTC milliseconds. When `isOpening` is true the reader is from outside the unit:
 * each read leaves an audit row, so the page does not poll, and nothing can be recorded.
 */
export type PatientPageDto = {
  nowMs: number
  unit: { id: string; name: string; timeZone: string; dayTrackFromHour: number; dayTrackToHour: number }
  isOpening: boolean
  openUntil: number | null
  patient: PatientHeadDto
  predictedBodyWeightKg: Reading
  /** Height below the range in which the formula was derived. */
  isHeightOutsideRange: boolean
  stay: StayDto
  /** The open episode, else the last one, else null. */
  episode: EpisodeDto | null
  earlierEpisodes: EpisodeDto[]
  ventilatorDayNumber: number | null
  /** Volume of the latest settings (measured, else set) for each kg of predicted body weight. */
  tidalVolumePerKg: { reading: Reading; from: 'measured' | 'set' | null; observedAt: number | null }
  /** null when the patient has never been ventilated here. */
  move: NextMove | null
  moveHref: string | null
  today: string
  trackFromMs: number
  trackToMs: number
  track: DayTrackDto
  /** For prefilled values: what stands now, to be confirmed, marked with its age. */
  latest: { settings: SettingsDto | null; gas: GasDto | null }
  /** Newest first. */
  days: PatientDayDto[]
  trends: TrendsDto
  may: PatientActions
}
