import { z } from 'zod'
import type { AirwayEvent, SupportAfter } from '@/lib/weaning/vocabulary'
import { amendsSchema, observedSchema, type EntryDto } from './observed'

/** What happens to the airway while ventilation goes on. Begin and end of ventilation write their own events. */
export const recordAirwaySchema = z.object({
  episodeId: z.string().min(1),
  observed: observedSchema,
  amends: amendsSchema,
  event: z.enum(['tracheostomy_placed'], { error: 'Choose what happened.' }),
  reason: z.string().trim().max(500, 'Keep this under 500 characters.').nullish(),
})
export type RecordAirwayInput = z.output<typeof recordAirwaySchema>

export type AirwayEventDto = EntryDto & { event: AirwayEvent; reason: string | null; supportAfter: SupportAfter | null }
