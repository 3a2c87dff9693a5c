import { readHospitalSchema, updateHospitalSchema } from '@/lib/schemas/hospital'
import { handle } from '@/lib/server/http'
import { readHospital } from '@/lib/services/hospital/read'
import { updateHospital } from '@/lib/services/hospital/update'

export const GET = handle({ input: readHospitalSchema, run: readHospital })
export const POST = handle({ input: updateHospitalSchema, run: updateHospital })
