import type { AirwayEvent, EpisodeEnd } from '@/lib/weaning/vocabulary'

/** The airway event that an end of ventilation is; null for a death or a transfer, where the airway itself stays as it was. */
export function airwayEventOf(end: EpisodeEnd): AirwayEvent | null {
  return end === 'died' || end === 'left_hospital' ? null : end
}

/** Events that end an episode. */
export const END_EVENTS = [
  'extubated',
  'self_extubated',
  'accidentally_extubated',
  'ventilator_off',
] as const satisfies readonly AirwayEvent[]
