import type { EpisodeRow } from '@/lib/access/door'
import type { EpisodeDto } from '@/lib/schemas/episodes'

/** One episode of ventilation, times in UTC milliseconds. */
export function toEpisodeDto(row: EpisodeRow): EpisodeDto {
  return {
    id: row.id,
    startedAt: row.startedAt,
    start: row.start,
    airway: row.airway,
    endedAt: row.endedAt,
    end: row.end,
    version: row.version,
  }
}
