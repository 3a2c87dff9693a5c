import { saveDraftSchema } from '@/lib/schemas/protocols'
import { handle } from '@/lib/server/http'
import { saveDraft } from '@/lib/services/protocols/save-draft'

export const POST = handle({ input: saveDraftSchema, run: saveDraft })
