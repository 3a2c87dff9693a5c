import { correctPatientSchema, readPatientSchema } from '@/lib/schemas/patients'
import { handle } from '@/lib/server/http'
import { correctPatient } from '@/lib/services/patients/correct'
import { readPatient } from '@/lib/services/patients/read'

export const GET = handle({ input: readPatientSchema, run: readPatient })
/** A correction of who the patient is. */
export const POST = handle({ input: correctPatientSchema, run: correctPatient })
