import { z } from 'zod'
import type { ProtocolContent } from '@/lib/weaning/protocol'
import type { ScreenCriterion } from '@/lib/weaning/vocabulary'
import { protocolContentSchema } from './protocol-content'
import { textLine } from './protocol-fields'

export const protocolQuerySchema = z.object({ unitId: z.string().min(1) })

/** A unit has at most one draft. `version` is null for a new draft, else the version of the draft that the form showed. */
export const saveDraftSchema = z.object({
  unitId: z.string().min(1),
  version: z.number().int().nullable(),
  content: protocolContentSchema,
  note: textLine('Say in a few words what changes and why.', 1000),
})
export type SaveDraftInput = z.output<typeof saveDraftSchema>

/** startDay null: in force from now on; else from the first minute of that later day of the unit. */
export const approveProtocolSchema = z.object({
  unitId: z.string().min(1),
  draftId: z.string().min(1),
  version: z.number().int(),
  startDay: z
    .string()
    .regex(/^\d{4}-\d{2}-\d{2}$/, 'Give the day, such as 2026-12-01.')
    .nullable(),
  note: z.string().trim().max(1000, 'Keep the note under 1000 characters.').nullable(),
})
export type ApproveProtocolInput = z.output<typeof approveProtocolSchema>

/** The rules of a version in plain words. */
export type DescribedProtocol = {
  criteria: { criterion: ScreenCriterion; label: string; limit: string; source: string }[]
  failRules: { id: string; words: string; source: string }[]
  stopRules: { id: string; words: string; source: string }[]
}

/** One version. Times in UTC milliseconds. */
export type ProtocolVersionDto = {
  id: string
  number: number
  isDefault: boolean
  content: ProtocolContent
  described: DescribedProtocol
  note: string
  draftedAt: number
  /** null for the product's default. */
  draftedByName: string | null
  approvedAt: number | null
  approvedByName: string | null
  startsAt: number | null
  version: number
}

export type ProtocolPageDto = {
  unit: { id: string; name: string; timeZone: string }
  nowMs: number
  /** The unit's calendar day, yyyy-mm-dd. */
  day: string
  current: ProtocolVersionDto
  /** Approved, with a start that is still to come; soonest first. */
  upcoming: ProtocolVersionDto[]
  /** Newest first. */
  past: ProtocolVersionDto[]
  draft: ProtocolVersionDto | null
  /** approve is false for a physician who drafted this draft; approveRefusal then says why. */
  may: { draft: boolean; approve: boolean }
  approveRefusal: string | null
}
