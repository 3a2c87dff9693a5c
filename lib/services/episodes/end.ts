import 'server-only'
import type { Tx } from '@/db/client'
import { insertAirwayEvent } from '@/db/queries/airway-events'
import { findLatestDecision, findObservedSpan, updateEpisode } from '@/db/queries/episodes'
import { authorize, type EpisodeInUnit } from '@/lib/access/door'
import type { EndEpisodeInput } from '@/lib/schemas/episodes'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import { AppError, invalidField } from '@/lib/shared/errors'
import { formatTime } from '@/lib/shared/format'
import { HOUR_MS, localDay, MINUTE_MS } from '@/lib/shared/time'
import { placeEntry } from '../entries/place-entry'
import { resolveObserved } from '../entries/resolve-observed'
import { airwayEventOf } from './airway-event-of'
import { endRunningTrial } from './end-running-trial'

/** A decision signed in the evening still covers an extubation shortly after midnight. */
const DECISION_HOLDS_MS = 12 * HOUR_MS

/**
 * Ends an episode of ventilation, with its airway event. Asks for a reason when a planned extubation has no signed decision of that day, and
 * for the outcome of a trial that still runs. An unplanned end is taken as it happened; it closes nothing else.
 */
export function endEpisode(ctx: Ctx, input: EndEpisodeInput): { episodeId: string; endedAt: number } {
  const found = authorize(ctx, 'episode.end', { episodeId: input.episodeId })
  return once(ctx, 'episode.end', input, (tx) => {
    if (ctx.actor.kind !== 'person') throw new AppError('FORBIDDEN', 'Only a person can record this.')
    const { episode, unit } = found
    if (episode.endedAt !== null) {
      throw new AppError(
        'CONFLICT',
        `Ventilation was already ended, at ${formatTime(episode.endedAt, unit.timeZone, ctx.now)}. Reload the page to see it; nothing was recorded.`,
      )
    }
    const endedAt = resolveObserved(input.observed, unit.timeZone, ctx.now)
    refuseWrongAirway(input, episode.airway)
    if (input.end === 'extubated') {
      refuseWithoutDecision(tx, found, endedAt, input.reason)
      endRunningTrial(tx, ctx, found, input.observed, endedAt, input.trialEnd)
    }
    refuseBeforeEntries(tx, found, endedAt, ctx.now)
    const { columns } = placeEntry(tx, ctx, found, { observed: input.observed })
    const event = airwayEventOf(input.end)
    if (event)
      insertAirwayEvent(tx, { ...columns, event, reason: input.reason ?? null, supportAfter: input.supportAfter ?? null })
    const after = updateEpisode(
      tx,
      { id: episode.id, version: input.version },
      {
        endedAt,
        end: input.end,
        endRecordedAt: ctx.now,
        endRecordedBy: ctx.actor.personId,
      },
    )
    if (!after)
      throw new AppError(
        'CONFLICT',
        'Someone changed this episode in the meantime. Reload the page to see it; nothing was recorded.',
      )
    writeAudit(tx, ctx, {
      action: 'episode.end',
      unitId: columns.unitId,
      subject: { kind: 'episode', id: episode.id },
      before: episode,
      after: { ...after, reason: input.reason ?? null },
    })
    return { episodeId: episode.id, endedAt }
  })
}

function refuseWrongAirway(input: EndEpisodeInput, airway: EpisodeInUnit['episode']['airway']): void {
  if (input.end === 'ventilator_off' && airway !== 'tracheostomy') {
    throw invalidField(
      'end',
      'Taking the ventilator off and leaving the airway goes with a tracheostomy. This patient has an endotracheal tube: choose the extubation.',
    )
  }
  if (airway === 'tracheostomy' && ['extubated', 'self_extubated'].includes(input.end)) {
    throw invalidField('end', 'This patient has a tracheostomy. Choose ventilator off.')
  }
}

function refuseWithoutDecision(
  tx: Tx,
  { episode, unit }: EpisodeInUnit,
  endedAt: number,
  reason: string | null | undefined,
): void {
  const decision = findLatestDecision(tx, episode.id)
  const isFor = decision?.choice === 'extubate' || decision?.choice === 'comfort_extubation'
  const isFresh =
    decision !== undefined &&
    (decision.ventilatorDay === localDay(endedAt, unit.timeZone) || Math.abs(endedAt - decision.observedAt) <= DECISION_HOLDS_MS)
  if ((isFor && isFresh) || (reason ?? '').length >= 3) return
  throw invalidField('reason', 'No signed decision to extubate stands for today. Say why the patient is extubated without it.')
}

/** Entries observed later than the end would fall out of the episode: they, or the time, must be wrong. */
function refuseBeforeEntries(tx: Tx, { episode, unit }: EpisodeInUnit, endedAt: number, now: number): void {
  const span = findObservedSpan(tx, episode.id)
  if (!span || span.lastMs <= endedAt + MINUTE_MS) return
  const last = formatTime(span.lastMs, unit.timeZone, now)
  throw invalidField(
    'observed.time',
    `An entry stands at ${last}, after this time. Give a later time, or correct that entry first.`,
  )
}
