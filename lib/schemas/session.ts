import { z } from 'zod'
import type { ClinicalRole } from '@/lib/weaning/vocabulary'
import { emailSchema, newPasswordSchema } from './people'

const passwordSchema = z.string().min(1, 'Write your password.').max(128, 'At most 128 characters.')

export const signInSchema = z.object({ email: emailSchema, password: passwordSchema })
export type SignInInput = z.output<typeof signInSchema>

export const requestResetSchema = z.object({ email: emailSchema })
export type RequestResetInput = z.output<typeof requestResetSchema>

export const resetPasswordSchema = z.object({
  token: z.string().min(10, 'This link is not complete. Open it again from the mail.').max(200),
  newPassword: newPasswordSchema,
})
export type ResetPasswordInput = z.output<typeof resetPasswordSchema>

export const lockSessionSchema = z.object({})
export const unlockSessionSchema = z.object({ password: passwordSchema })
export type UnlockSessionInput = z.output<typeof unlockSessionSchema>

export const endSessionsSchema = z.object({})

export const changePasswordSchema = z
  .object({ currentPassword: passwordSchema, newPassword: newPasswordSchema })
  .refine((input) => input.currentPassword !== input.newPassword, {
    error: 'Choose a password that differs from the present one.',
    path: ['newPassword'],
  })
export type ChangePasswordInput = z.output<typeof changePasswordSchema>

/** A path of our own to come back to; anything that could lead to another site is dropped. */
export const nextPathSchema = z
  .string()
  .regex(/^\/(?![/\\])[^\s\\]*$/)
  .max(500)
  .catch('/')

export const readMeSchema = z.object({})

/** The signed-in person, for the frame of the pages. Holds no patient data; also given while the screen is locked. */
export type MeDto = {
  name: string
  email: string
  hospitalName: string
  isDemo: boolean
  isAdministrator: boolean
  memberships: { unitId: string; unitName: string; timeZone: string; role: ClinicalRole }[]
  isLocked: boolean
  /** Minutes without activity after which the screen locks. */
  idleLockMin: number
}
