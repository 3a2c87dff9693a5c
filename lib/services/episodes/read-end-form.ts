import 'server-only'
import { listDayEntries } from '@/db/queries/day-entries'
import { findLatestDecision } from '@/db/queries/episodes'
import { findPersonName } from '@/db/queries/steps'
import { authorize } from '@/lib/access/door'
import type { EndFormDto } from '@/lib/schemas/bedside-forms'
import type { Ctx } from '@/lib/server/ctx'
import { readBedsideForm } from '../steps/read-bedside-form'
import { mayHere } from '../steps/read-step-form'
import { toEpisodeDto } from './to-episode-dto'

/** What the form for the end of ventilation shows: the decision that stands, and whether a trial still runs. */
export function readEndForm(ctx: Ctx, { episodeId }: { episodeId: string }): EndFormDto {
  const found = authorize(ctx, 'patient.read', { episodeId })
  const base = readBedsideForm(ctx, found)
  const decision = findLatestDecision(ctx.db, episodeId)
  const isForExtubation = decision?.choice === 'extubate' || decision?.choice === 'comfort_extubation'
  const { trials, trialEnds } = listDayEntries(ctx.db, [episodeId], base.ventilatorDay, ctx.now)
  return {
    ...base,
    episode: toEpisodeDto(found.episode),
    signed:
      decision && isForExtubation
        ? { choice: decision.choice, signedAt: decision.recordedAt, byName: findPersonName(ctx.db, decision.recordedBy) ?? '' }
        : null,
    isTrialRunning: trials.some((trial) => !trialEnds.some((end) => end.trialId === trial.entryId)),
    may: { end: mayHere(ctx.actor, found, 'episode.end') },
  }
}
