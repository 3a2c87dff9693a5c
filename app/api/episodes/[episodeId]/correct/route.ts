import { correctEpisodeSchema } from '@/lib/schemas/episodes'
import { handle } from '@/lib/server/http'
import { correctEpisode } from '@/lib/services/episodes/correct'

export const POST = handle({ input: correctEpisodeSchema, run: correctEpisode })
