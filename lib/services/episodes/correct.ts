import 'server-only'
import { updateEpisode } from '@/db/queries/episodes'
import { authorize, type EpisodeInUnit } from '@/lib/access/door'
import type { CorrectEpisodeInput } from '@/lib/schemas/episodes'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import { AppError } from '@/lib/shared/errors'
import { mayAmend } from '../entries/may-amend'
import { resolveObserved } from '../entries/resolve-observed'
import { amendBeginEvent, amendEndEvent } from './amend-airway-events'
import { refuseImpossibleSpan } from './refuse-impossible-span'

/**
 * Corrects when and how an episode began or ended, or that it ended at all, by its author or a physician. The airway events get new versions
 * with the reason; the old ones stay readable.
 */
export function correctEpisode(ctx: Ctx, input: CorrectEpisodeInput): { episodeId: string } {
  const found = authorize(ctx, 'episode.end', { episodeId: input.episodeId })
  return once(ctx, 'episode.end', input, (tx) => {
    const { episode, unit } = found
    const began = {
      at: resolveObserved(input.began.observed, unit.timeZone, ctx.now, 'began.observed'),
      start: input.began.start,
    }
    const ended = input.ended && {
      at: resolveObserved(input.ended.observed, unit.timeZone, ctx.now, 'ended.observed'),
      end: input.ended.end,
    }
    const isBeginChanged = !isSameMinute(began.at, episode.startedAt) || began.start !== episode.start
    const isEndChanged = ended
      ? episode.endedAt === null || !isSameMinute(ended.at, episode.endedAt) || ended.end !== episode.end
      : episode.endedAt !== null
    refuseUnasked(ctx, found, { isBeginChanged, isEndChanged, hasEnd: ended !== null })
    const startedAt = isBeginChanged ? began.at : episode.startedAt
    const endedAt = ended && (isEndChanged ? ended.at : episode.endedAt)
    refuseImpossibleSpan(tx, ctx, found, { startedAt, start: began.start, endedAt, end: ended?.end ?? null })
    const after = updateEpisode(
      tx,
      { id: episode.id, version: input.version },
      { startedAt, start: began.start, endedAt, end: ended?.end ?? null },
    )
    if (!after)
      throw new AppError(
        'CONFLICT',
        'Someone changed this episode in the meantime. Reload the page to see it; nothing was changed.',
      )
    const corrected = { ...found, episode: after }
    if (isBeginChanged) amendBeginEvent(tx, ctx, corrected, input)
    if (isEndChanged) amendEndEvent(tx, ctx, corrected, input)
    writeAudit(tx, ctx, {
      action: 'episode.correct',
      unitId: unit.id,
      subject: { kind: 'episode', id: episode.id },
      before: episode,
      after: { ...after, reason: input.reason },
    })
    return { episodeId: episode.id }
  })
}

/** Forms give whole minutes: a moment that differs only in its seconds was not changed. */
function isSameMinute(a: number, b: number): boolean {
  return Math.floor(a / 60_000) === Math.floor(b / 60_000)
}

type Changes = { isBeginChanged: boolean; isEndChanged: boolean; hasEnd: boolean }

function refuseUnasked(ctx: Ctx, { episode, unit }: EpisodeInUnit, { isBeginChanged, isEndChanged, hasEnd }: Changes): void {
  if (!isBeginChanged && !isEndChanged) throw new AppError('INVALID', 'Nothing is different from what is on record.')
  if (isEndChanged && hasEnd && episode.endedAt === null) {
    throw new AppError('PRECONDITION', 'Ventilation has not been ended yet. Record its end on the page for that.')
  }
  const isAllowed =
    (!isBeginChanged || mayAmend(ctx, unit.id, episode.recordedBy)) &&
    (!isEndChanged || mayAmend(ctx, unit.id, episode.endRecordedBy))
  if (!isAllowed) throw new AppError('FORBIDDEN', 'Only the author of an entry or a physician can correct it.')
}
