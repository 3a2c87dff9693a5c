import type { AirwayEventDto } from './airway'
import type { EpisodeDto } from './episodes'
import type { GasDto } from './gases'
import type { SettingsDto } from './settings'
import type { StepFormDto } from './step-form'
import type { DecisionChoice } from '@/lib/weaning/vocabulary'

/** What every bedside form needs to show whom it is about and to place its entry. */
export type BedsideFormDto = Omit<StepFormDto, 'seenLatestId'>

/** `latest` holds the settings last observed, to be taken over with one tap; `amending` the version to correct. */
export type SettingsFormDto = BedsideFormDto & {
  latest: SettingsDto | null
  amending: SettingsDto | null
  may: { record: boolean }
}
export type GasFormDto = BedsideFormDto & { amending: GasDto | null; may: { record: boolean } }
export type AirwayFormDto = BedsideFormDto & { amending: AirwayEventDto | null; may: { record: boolean } }

export type EndFormDto = BedsideFormDto & {
  episode: EpisodeDto
  /** The decision last signed, when it is for taking the tube out. */
  signed: { choice: DecisionChoice; signedAt: number; byName: string } | null
  isTrialRunning: boolean
  may: { end: boolean }
}
