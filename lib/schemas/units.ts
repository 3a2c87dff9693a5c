import { z } from 'zod'

const idSchema = z.string().min(1).max(64)
const labelSchema = z.string().trim().min(1, 'Write the bed label.').max(12, 'At most 12 characters.')

/** Whether the name is one of the time zones that this computer knows, such as America/Denver. */
export function isTimeZone(name: string): boolean {
  try {
    new Intl.DateTimeFormat('en', { timeZone: name })
    return /^[A-Za-z]+(\/[A-Za-z0-9_+-]+)+$|^UTC$/.test(name)
  } catch {
    return false
  }
}

// Bounds of places where people live, and the pressures that go with them; common practice, no source.
const placeShape = {
  name: z.string().trim().min(1, 'Write the name of the unit.').max(80, 'At most 80 characters.'),
  timeZone: z.string().trim().refine(isTimeZone, 'Choose a time zone by region and city, such as America/Denver.'),
  altitudeM: z
    .number({ error: 'Write the altitude in metres above sea level; 0 at the coast.' })
    .min(-450, 'At least \u2212450 m.')
    .max(5200, 'At most 5200 m.'),
  barometricPressureMmHg: z
    .number({ error: 'Write the pressure in mmHg, or leave it empty.' })
    .min(380, 'At least 380 mmHg. A reading in hPa or kPa must be converted first.')
    .max(820, 'At most 820 mmHg. A reading in hPa must be converted first: 1013 hPa are 760 mmHg.')
    .nullable(),
}

export const bedLabelsSchema = z
  .array(labelSchema)
  .max(100, 'At most 100 beds at once.')
  .refine(
    (labels) => new Set(labels.map((label) => label.toLowerCase())).size === labels.length,
    'Each bed needs a label of its own.',
  )

export const createUnitSchema = z.object({ ...placeShape, bedLabels: bedLabelsSchema })
export type CreateUnitInput = z.output<typeof createUnitSchema>

export const updateUnitSchema = z
  .object({
    unitId: idSchema,
    version: z.int(),
    ...placeShape,
    dayTrackFromHour: z.int('Write a whole hour.').min(0, 'From 0 to 23.').max(23, 'From 0 to 23.'),
    dayTrackToHour: z.int('Write a whole hour.').min(1, 'From 1 to 24.').max(24, 'From 1 to 24.'),
  })
  .refine((input) => input.dayTrackToHour - input.dayTrackFromHour >= 4, {
    error: 'The day track must cover at least four hours.',
    path: ['dayTrackToHour'],
  })
export type UpdateUnitInput = z.output<typeof updateUnitSchema>

export const addBedsSchema = z.object({ unitId: idSchema, bedLabels: bedLabelsSchema.min(1, 'Write at least one bed label.') })
export type AddBedsInput = z.output<typeof addBedsSchema>

export const retireBedSchema = z.object({ bedId: idSchema })
export type RetireBedInput = z.output<typeof retireBedSchema>

export const listUnitsSchema = z.object({})

/** A unit as its administration sees it: no patient, and not which bed is taken. */
export type UnitAdminDto = {
  id: string
  name: string
  timeZone: string
  altitudeM: number
  barometricPressureMmHg: number | null
  dayTrackFromHour: number
  dayTrackToHour: number
  version: number
  beds: { id: string; label: string; isRetired: boolean }[]
}
