import { z } from 'zod'

/** When something was observed, as the wall clock of the unit showed it. `fold` is asked for only in the hour that is doubled in autumn. */
export const observedSchema = z.object({
  day: z.string({ error: 'Give the day.' }).regex(/^\d{4}-\d{2}-\d{2}$/, 'Give the day, such as 2026-12-01.'),
  time: z
    .string({ error: 'Give the time.' })
    .regex(/^([01]\d|2[0-3]):[0-5]\d$/, 'Give the time on the 24-hour clock, such as 05:40.'),
  fold: z.enum(['first', 'second']).optional(),
})
export type ObservedInput = z.input<typeof observedSchema>

/** Set when the entry corrects an earlier one: which version, and why. */
export const amendsSchema = z
  .object({ id: z.string().min(1), reason: z.string().trim().min(3, 'Say why this is corrected, in a few words.').max(500) })
  .nullish()

/** What every entry of an episode is sent with. */
export const entryInput = {
  episodeId: z.string().min(1),
  observed: observedSchema,
  amends: amendsSchema,
  /** Fields whose unlikely value was looked at twice and kept; see askSecondLook in reading.ts. */
  confirmedUnlikely: z.array(z.string().max(80)).max(60).optional(),
}

/** What every entry answer carries. Times in UTC milliseconds. */
export type EntryDto = {
  id: string
  entryId: string
  entryVersion: number
  isAmended: boolean
  amendReason: string | null
  isLate: boolean
  observedAt: number
  recordedAt: number
  recordedByName: string
  ventilatorDay: string
  protocolNumber: number
  /** Fields whose value lies outside what is usual, as dotted paths; kept after a second look and marked on the page. */
  unlikely: string[]
}
