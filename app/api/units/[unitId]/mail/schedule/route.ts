import { saveMailScheduleSchema } from '@/lib/schemas/mail'
import { handle } from '@/lib/server/http'
import { saveMailSchedule } from '@/lib/services/mail/save-schedule'

export const POST = handle({ input: saveMailScheduleSchema, run: saveMailSchedule })
