import { beginEpisodeSchema } from '@/lib/schemas/episodes'
import { handle } from '@/lib/server/http'
import { beginEpisode } from '@/lib/services/episodes/begin'

export const POST = handle({ input: beginEpisodeSchema, run: beginEpisode })
