import { Mark } from '@/components/ui/mark'
import { clockTime } from '@/lib/client/wall-clock'
import { formatDuration } from '@/lib/shared/format'
import type { PatientPageDto } from '@/lib/schemas/patient-page'
import { AIRWAY_WORDS, EPISODE_END_WORDS, EPISODE_START_WORDS } from '@/lib/weaning/words'

/** Every episode of ventilation, newest first, and the airway it was through. */
export function EpisodeList({ page, nowMs }: { page: PatientPageDto; nowMs: number }) {
  const { timeZone } = page.unit
  const all = [page.episode, ...page.earlierEpisodes].filter((episode) => episode !== null)
  if (all.length === 0) return null
  return (
    <section aria-labelledby="episodes">
      <h2 id="episodes" className="mb-2 text-xl font-bold">
        Episodes of ventilation
      </h2>
      <ul>
        {all.map((episode) => (
          <li key={episode.id} className="border-t border-line py-2.5">
            <p>
              {clockTime(episode.startedAt, timeZone, nowMs)} {EPISODE_START_WORDS[episode.start]}, {AIRWAY_WORDS[episode.airway]}
              {episode.endedAt === null || episode.end === null ? (
                <>
                  {' '}
                  <Mark shape="dot" className="text-dawn" /> running, {formatDuration(nowMs - episode.startedAt)}
                </>
              ) : (
                <>
                  ; {clockTime(episode.endedAt, timeZone, nowMs)} {EPISODE_END_WORDS[episode.end]}, after{' '}
                  {formatDuration(episode.endedAt - episode.startedAt)}
                </>
              )}
            </p>
          </li>
        ))}
      </ul>
    </section>
  )
}
