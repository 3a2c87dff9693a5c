import { z } from 'zod'
import { recordNumberSchema } from './patients'

/** Hours that an opened record stays open. */
export const OPENING_HOURS = 8

export const openRecordSchema = z.object({
  recordNumber: recordNumberSchema,
  reason: z
    .string({ error: 'Say why you open this record.' })
    .trim()
    .min(10, 'Say why you open this record, in at least 10 characters. The unit lead reads it.')
    .max(500, 'Keep this under 500 characters.'),
})
export type OpenRecordInput = z.output<typeof openRecordSchema>

/** `expiresAt` is null when the patient is in one of the reader's own units and no opening was needed. */
export type OpenedRecordDto = { patientId: string; expiresAt: number | null }

export const listOpeningsSchema = z.object({ unitId: z.string().min(1) })

export type OpeningDto = {
  id: string
  openedAt: number
  expiresAt: number
  isOpen: boolean
  personName: string
  reason: string
  patientId: string
  familyName: string
  givenName: string
  recordNumber: string
}
/** Newest first. */
export type OpeningListDto = { unit: { id: string; name: string; timeZone: string }; nowMs: number; openings: OpeningDto[] }
