import { endEpisodeSchema } from '@/lib/schemas/episodes'
import { handle } from '@/lib/server/http'
import { endEpisode } from '@/lib/services/episodes/end'

export const POST = handle({ input: endEpisodeSchema, run: endEpisode })
