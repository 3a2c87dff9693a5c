import { z } from 'zod'
import { CLINICAL_ROLES, type ClinicalRole } from '@/lib/weaning/vocabulary'

export const PASSWORD_MIN = 12
export const PASSWORD_MAX = 128

export const personNameSchema = z.string().trim().min(1, 'Write the name.').max(120, 'At most 120 characters.')
export const emailSchema = z
  .string()
  .trim()
  .toLowerCase()
  .min(1, 'Write the e-mail address.')
  .max(254, 'At most 254 characters.')
  .pipe(z.email('Write an e-mail address, such as rowan@hospital.example.'))

/** A password to be set. Long rather than complicated; a handful of repeated characters is refused. */
export const newPasswordSchema = z
  .string()
  .min(PASSWORD_MIN, `Use at least ${PASSWORD_MIN} characters; a short sentence works well.`)
  .max(PASSWORD_MAX, `Use at most ${PASSWORD_MAX} characters.`)
  .refine((text) => new Set(text).size >= 5, 'Use at least five different characters.')

const membershipSchema = z.object({
  unitId: z.string().min(1).max(64),
  role: z.enum(CLINICAL_ROLES, { error: 'Choose a role.' }),
})
/** Roles in units; the same one twice counts once. */
const membershipsSchema = z
  .array(membershipSchema)
  .max(200, 'At most 200 roles.')
  .transform((given) =>
    given.filter((one, at) => at === given.findIndex((other) => other.unitId === one.unitId && other.role === one.role)),
  )

const rightsShape = {
  isAdministrator: z.boolean({ error: 'Say whether this person is an administrator.' }),
  memberships: membershipsSchema,
}
const NO_RIGHTS = 'Give at least one role in a unit, or make the person an administrator.'

export const invitePersonSchema = z
  .object({ name: personNameSchema, email: emailSchema, ...rightsShape })
  .refine((input) => input.isAdministrator || input.memberships.length > 0, { error: NO_RIGHTS, path: ['memberships'] })
export type InvitePersonInput = z.output<typeof invitePersonSchema>

export const setRolesSchema = z
  .object({ personId: z.string().min(1).max(64), version: z.int(), ...rightsShape })
  .refine((input) => input.isAdministrator || input.memberships.length > 0, { error: NO_RIGHTS, path: ['memberships'] })
export type SetRolesInput = z.output<typeof setRolesSchema>

export const deactivatePersonSchema = z.object({ personId: z.string().min(1).max(64), version: z.int() })
export type DeactivatePersonInput = z.output<typeof deactivatePersonSchema>

export const reinvitePersonSchema = z.object({ personId: z.string().min(1).max(64), version: z.int() })
export type ReinvitePersonInput = z.output<typeof reinvitePersonSchema>

export const listPeopleSchema = z.object({})

const tokenSchema = z.string().min(20, 'This link is not complete. Open it again from the mail.').max(200)

/** What the page behind a one-time link sends: a password, and for the first administrator also who and which hospital. */
export const acceptInvitationSchema = z.object({ kind: z.literal('invitation'), token: tokenSchema, password: newPasswordSchema })
export const acceptSetupSchema = z.object({
  kind: z.literal('setup'),
  token: tokenSchema,
  hospitalName: z.string().trim().min(1, 'Write the name of the hospital.').max(120, 'At most 120 characters.'),
  name: personNameSchema,
  email: emailSchema,
  password: newPasswordSchema,
})
export const acceptLinkSchema = z.discriminatedUnion('kind', [acceptInvitationSchema, acceptSetupSchema])
export type AcceptLinkInput = z.output<typeof acceptLinkSchema>

/** A one-time link as its page sees it. */
export type AccountLinkDto = { kind: 'setup' } | { kind: 'invitation'; name: string; email: string; hospitalName: string }

export type PersonState = 'active' | 'invited' | 'deactivated'
export type PersonDto = {
  id: string
  name: string
  email: string
  isAdministrator: boolean
  state: PersonState
  /** For an invited person: when the link runs out (UTC ms); null when none is open. */
  invitationExpiresAt: number | null
  memberships: { unitId: string; unitName: string; role: ClinicalRole }[]
  version: number
}
export type PeopleDto = { people: PersonDto[]; units: { id: string; name: string }[] }
