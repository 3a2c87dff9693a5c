import type { TrialDto } from '@/lib/schemas/trials'
import type { ObservedReadings } from '@/lib/weaning/readings'

type Number = Exclude<keyof ObservedReadings, 'signs'>

/** The latest observation that has this reading, with its value and time (UTC ms); null when none has. */
export function lastObserved(trial: Pick<TrialDto, 'observations'>, reading: Number): { value: number; atMs: number } | null {
  for (const observation of [...trial.observations].reverse()) {
    const value = observation.readings[reading]
    if (value !== null) return { value, atMs: observation.observedAt }
  }
  return null
}
