import { z } from 'zod'
import type { ClinicalRole, MailKind, MailState } from '@/lib/weaning/vocabulary'

export const mailUnitSchema = z.object({ unitId: z.string().min(1) })
export const mailOneSchema = z.object({ unitId: z.string().min(1), mailId: z.string().min(1) })

/** Minutes after local midnight; null switches the morning list off. */
export const saveMailScheduleSchema = z.object({
  unitId: z.string().min(1),
  version: z.number().int(),
  morningTime: z
    .string()
    .regex(/^([01]\d|2[0-3]):[0-5]\d$/, 'Give the time on the 24-hour clock, such as 05:00.')
    .nullable(),
  isWindowEndOn: z.boolean(),
  isDecisionOwedOn: z.boolean(),
})
export type SaveMailScheduleInput = z.output<typeof saveMailScheduleSchema>

export type MailEntryDto = {
  id: string
  kind: MailKind
  state: MailState
  personName: string | null
  /** Shown to the unit lead only. */
  recipient: string | null
  subject: string
  bodyText: string
  attempts: number
  lastError: string | null
  queuedAt: number
  nextAttemptAt: number
  sentAt: number | null
}

export type MailPageDto = {
  unit: { id: string; name: string; timeZone: string }
  nowMs: number
  /** True when no SMTP server is configured: messages are kept as files, not sent. */
  isKeptAsFiles: boolean
  schedule: { version: number; morningTime: string | null; isWindowEndOn: boolean; isDecisionOwedOn: boolean } | null
  /** What goes next by the clock, and who gets it. */
  upcoming: { kind: MailKind; atMs: number; toRoles: ClinicalRole[]; recipients: number }[]
  entries: MailEntryDto[]
  maySchedule: boolean
}
