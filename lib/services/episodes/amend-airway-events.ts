import 'server-only'
import type { Tx } from '@/db/client'
import { findAirwayEvent, findAirwayEventVersion, insertAirwayEvent } from '@/db/queries/airway-events'
import type { EpisodeInUnit } from '@/lib/access/door'
import type { CorrectEpisodeInput } from '@/lib/schemas/episodes'
import type { ObservedInput } from '@/lib/schemas/observed'
import type { Ctx } from '@/lib/server/ctx'
import { EPISODE_STARTS, type AirwayEvent } from '@/lib/weaning/vocabulary'
import { placeEntry } from '../entries/place-entry'
import { toWallClock } from '../steps/to-wall-clock'
import { airwayEventOf, END_EVENTS } from './airway-event-of'

/** Adds the corrected version of the event that began the (already corrected) episode. */
export function amendBeginEvent(tx: Tx, ctx: Ctx, found: EpisodeInUnit, input: CorrectEpisodeInput): void {
  const event = findAirwayEvent(tx, found.episode.id, EPISODE_STARTS, 'first')
  addVersion(tx, ctx, found, {
    amendedId: event?.id,
    observed: input.began.observed,
    event: input.began.start,
    reason: input.reason,
  })
}

/** Adds the corrected version of the event that ended the episode; withdraws it when the episode did not end, or not by the airway. */
export function amendEndEvent(tx: Tx, ctx: Ctx, found: EpisodeInUnit, input: CorrectEpisodeInput): void {
  const standing = findAirwayEvent(tx, found.episode.id, END_EVENTS, 'last')
  const event = input.ended && airwayEventOf(input.ended.end)
  if (input.ended && event) {
    addVersion(tx, ctx, found, { amendedId: standing?.id, observed: input.ended.observed, event, reason: input.reason })
  } else if (standing) {
    const observed = toWallClock(standing.observedAt, found.unit.timeZone)
    addVersion(tx, ctx, found, {
      amendedId: standing.id,
      observed,
      event: standing.event,
      reason: input.reason,
      isWithdrawn: true,
    })
  }
}

type Version = {
  amendedId: string | undefined
  observed: ObservedInput
  event: AirwayEvent
  reason: string
  isWithdrawn?: boolean
}

function addVersion(tx: Tx, ctx: Ctx, found: EpisodeInUnit, version: Version): void {
  const amended = version.amendedId === undefined ? undefined : findAirwayEventVersion(tx, version.amendedId)
  const { columns } = placeEntry(tx, ctx, found, {
    observed: version.observed,
    amends: amended ? { id: amended.row.id, reason: version.reason } : null,
    findAmended: () => amended,
    mayFollowEnd: true,
  })
  insertAirwayEvent(tx, {
    ...columns,
    event: version.event,
    reason: amended?.row.reason ?? null,
    supportAfter: amended?.row.supportAfter ?? null,
    isWithdrawn: version.isWithdrawn ?? false,
  })
}
