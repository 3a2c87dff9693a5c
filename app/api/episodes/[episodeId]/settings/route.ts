import { recordSettingsSchema } from '@/lib/schemas/settings'
import { handle } from '@/lib/server/http'
import { recordSettings } from '@/lib/services/settings/record'

export const POST = handle({ input: recordSettingsSchema, run: recordSettings })
