import { z } from 'zod'
import { observedSchema } from './observed'

/** To another bed, of this unit or another one of the hospital. `stayId` is the stay as the form was opened with. */
export const moveStaySchema = z.object({
  patientId: z.string().min(1),
  stayId: z.string().min(1),
  unitId: z.string({ error: 'Choose the unit.' }).min(1, 'Choose the unit.'),
  bedId: z.string({ error: 'Choose the bed.' }).min(1, 'Choose the bed.'),
  observed: observedSchema,
})
export type MoveStayInput = z.output<typeof moveStaySchema>

export const endStaySchema = z.object({
  patientId: z.string().min(1),
  stayId: z.string().min(1),
  end: z.enum(['left_unit', 'died'], { error: 'Choose how the stay ended.' }),
  observed: observedSchema,
})
export type EndStayInput = z.output<typeof endStaySchema>

export const moveFormQuerySchema = z.object({ patientId: z.string().min(1) })

/** What the form for a move shows: the units of the hospital with their free beds. Names no other patient. */
export type MoveFormDto = {
  nowMs: number
  timeZone: string
  patient: { id: string; familyName: string; givenName: string }
  stay: { id: string; unitId: string; bedLabel: string; startedAt: number }
  units: { id: string; name: string; freeBeds: { id: string; label: string }[] }[]
}
