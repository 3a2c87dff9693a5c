import { admitPatientSchema, listPatientsSchema } from '@/lib/schemas/patients'
import { handle } from '@/lib/server/http'
import { admitPatient } from '@/lib/services/patients/admit'
import { listPatients } from '@/lib/services/patients/list'

export const GET = handle({ input: listPatientsSchema, run: listPatients })
export const POST = handle({ input: admitPatientSchema, run: admitPatient })
