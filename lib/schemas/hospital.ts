import { z } from 'zod'

export const readHospitalSchema = z.object({})

export const updateHospitalSchema = z.object({
  name: z.string().trim().min(1, 'Write the name of the hospital.').max(120, 'At most 120 characters.'),
  idleLockMin: z.int('Write whole minutes.').min(1, 'At least 1 minute.').max(240, 'At most 240 minutes.'),
  version: z.int(),
})
export type UpdateHospitalInput = z.output<typeof updateHospitalSchema>

export type HospitalDto = { name: string; idleLockMin: number; isDemo: boolean; version: number }
