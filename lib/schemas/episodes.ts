import { z } from 'zod'
import {
  AIRWAYS,
  EPISODE_ENDS,
  EPISODE_STARTS,
  SUPPORTS_AFTER,
  TRIAL_OUTCOMES,
  type Airway,
  type EpisodeEnd,
  type EpisodeStart,
} from '@/lib/weaning/vocabulary'
import { observedSchema } from './observed'

const freeText = z.string().trim().max(500, 'Keep this under 500 characters.')

/** Ends that take the tube out. */
export const EXTUBATION_ENDS = ['extubated', 'self_extubated', 'accidentally_extubated'] as const satisfies readonly EpisodeEnd[]

export function isExtubation(end: EpisodeEnd | null): boolean {
  return EXTUBATION_ENDS.some((kind) => kind === end)
}

/** Which airway a way of starting goes with; null when either is possible. */
const AIRWAY_OF_START: Record<EpisodeStart, Airway | null> = {
  intubated: 'endotracheal_tube',
  reintubated: 'endotracheal_tube',
  ventilator_on: 'tracheostomy',
  arrived_intubated: null,
}

export const beginEpisodeSchema = z
  .object({
    patientId: z.string().min(1),
    observed: observedSchema,
    start: z.enum(EPISODE_STARTS, { error: 'Choose how ventilation began.' }),
    airway: z.enum(AIRWAYS, { error: 'Choose the airway.' }),
  })
  .superRefine((input, issues) => {
    const airway = AIRWAY_OF_START[input.start]
    if (airway === null || airway === input.airway) return
    const message =
      airway === 'tracheostomy'
        ? 'Ventilation that is taken up again goes with a tracheostomy. For a new tube choose intubated or reintubated.'
        : 'Intubation goes with an endotracheal tube. For a tracheostomy choose ventilator on, or arrived intubated.'
    issues.addIssue({ code: 'custom', path: ['airway'], message })
  })
export type BeginEpisodeInput = z.output<typeof beginEpisodeSchema>

/** How ventilation ended. `trialEnd` is asked for when a planned extubation finds a trial still running. */
export const endEpisodeSchema = z
  .object({
    episodeId: z.string().min(1),
    /** The episode's version as the form was opened with. */
    version: z.number().int(),
    observed: observedSchema,
    end: z.enum(EPISODE_ENDS, { error: 'Choose how ventilation ended.' }),
    supportAfter: z.enum(SUPPORTS_AFTER, { error: 'Choose the support afterwards.' }).nullish(),
    reason: freeText.nullish(),
    trialEnd: z
      .object({ outcome: z.enum(TRIAL_OUTCOMES, { error: 'Choose how the trial ended.' }), reason: freeText.nullish() })
      .nullish(),
  })
  .superRefine((input, issues) => {
    if (input.end === 'extubated' && !input.supportAfter) {
      issues.addIssue({ code: 'custom', path: ['supportAfter'], message: 'Choose the support after extubation.' })
    }
    if (['died', 'left_hospital'].includes(input.end) && input.supportAfter) {
      issues.addIssue({ code: 'custom', path: ['supportAfter'], message: 'Leave the support afterwards empty here.' })
    }
  })
export type EndEpisodeInput = z.output<typeof endEpisodeSchema>

/**
 * Correction of when and how an episode began or ended. Give what stands now for what stays as it is; `ended: null` says that
 * ventilation did not end after all.
 */
export const correctEpisodeSchema = z.object({
  episodeId: z.string().min(1),
  version: z.number().int(),
  began: z.object({ observed: observedSchema, start: z.enum(EPISODE_STARTS, { error: 'Choose how ventilation began.' }) }),
  ended: z.object({ observed: observedSchema, end: z.enum(EPISODE_ENDS, { error: 'Choose how ventilation ended.' }) }).nullable(),
  reason: freeText.min(3, 'Say why this is corrected, in a few words.'),
})
export type CorrectEpisodeInput = z.output<typeof correctEpisodeSchema>

export type EpisodeDto = {
  id: string
  startedAt: number
  start: EpisodeStart
  airway: Airway
  endedAt: number | null
  end: EpisodeEnd | null
  version: number
}
