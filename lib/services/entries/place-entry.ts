import 'server-only'
import type { Tx } from '@/db/client'
import { findProtocolInForce, findProtocolVersion } from '@/db/queries/protocols'
import { findUnitAt } from '@/db/queries/stays'
import type { EpisodeInUnit } from '@/lib/access/door'
import type { Ctx } from '@/lib/server/ctx'
import type { ObservedInput } from '@/lib/schemas/observed'
import { AppError, invalidField } from '@/lib/shared/errors'
import { formatTime } from '@/lib/shared/format'
import { newId } from '@/lib/shared/ids'
import { localDay, MINUTE_MS } from '@/lib/shared/time'
import { mayAmend } from './may-amend'
import { resolveObserved } from './resolve-observed'

/** The version that an amendment replaces, as read by the aggregate's own query. */
export type AmendedRow = {
  id: string
  entryId: string
  entryVersion: number
  episodeId: string
  recordedBy: string
  protocolVersionId: string
}

type PlaceInput = {
  observed: ObservedInput
  amends?: { id: string; reason: string } | null | undefined
  /** Reads the version to amend together with whether another one already supersedes it. */
  findAmended?: (id: string) => { row: AmendedRow; isSuperseded: boolean } | undefined
  /** True for what may be observed after the episode ended (an extubation's own event, the watch). */
  mayFollowEnd?: boolean
}

/**
 * Gives a new entry its place: the moment, the unit the patient was in, the ventilator day there, the protocol in force at that moment (an
 * amendment keeps the version that the entry was first judged by), and its place in the chain of versions. Refuses a time outside the episode, and an amendment by someone other than its author or a physician.
 */
export function placeEntry(tx: Tx, ctx: Ctx, found: EpisodeInUnit, input: PlaceInput) {
  if (ctx.actor.kind !== 'person') throw new AppError('FORBIDDEN', 'Only a person can record this.')
  const { episode, patient, unit: currentUnit } = found
  const observedAt = resolveObserved(input.observed, currentUnit.timeZone, ctx.now)
  refuseOutsideEpisode(found, observedAt, ctx.now, input.mayFollowEnd ?? false)
  const unit = findUnitAt(tx, patient.id, observedAt) ?? currentUnit
  const amended = input.amends ? findAmendable(ctx, found, input.amends.id, input.findAmended) : null
  const protocol = amended ? findProtocolVersion(tx, amended.protocolVersionId) : findProtocolInForce(tx, unit.id, observedAt)
  if (!protocol) throw new AppError('PRECONDITION', 'This unit has no protocol yet. An administrator sets the unit up first.')
  const id = newId()
  const columns = {
    id,
    entryId: amended?.entryId ?? id,
    entryVersion: (amended?.entryVersion ?? 0) + 1,
    supersedesId: amended?.id ?? null,
    amendReason: input.amends?.reason ?? null,
    episodeId: episode.id,
    unitId: unit.id,
    ventilatorDay: localDay(observedAt, unit.timeZone),
    observedAt,
    recordedAt: ctx.now,
    recordedBy: ctx.actor.personId,
    protocolVersionId: protocol.id,
  }
  return { columns, protocol, unit }
}

function refuseOutsideEpisode(found: EpisodeInUnit, observedAt: number, now: number, mayFollowEnd: boolean): void {
  const { episode, unit } = found
  // A minute of grace: forms give whole minutes, the episode may have begun within one.
  if (observedAt < episode.startedAt - MINUTE_MS) {
    throw invalidField(
      'observed.time',
      `This is before ventilation began (${formatTime(episode.startedAt, unit.timeZone, now)}). Give a later time.`,
    )
  }
  if (!mayFollowEnd && episode.endedAt !== null && observedAt > episode.endedAt + MINUTE_MS) {
    throw invalidField(
      'observed.time',
      `Ventilation ended at ${formatTime(episode.endedAt, unit.timeZone, now)}. Give an earlier time.`,
    )
  }
}

function findAmendable(ctx: Ctx, found: EpisodeInUnit, id: string, findAmended: PlaceInput['findAmended']): AmendedRow {
  const amended = findAmended?.(id)
  if (!amended || amended.row.episodeId !== found.episode.id)
    throw new AppError('NOT_FOUND', 'The entry to correct was not found.')
  if (amended.isSuperseded) {
    throw new AppError(
      'CONFLICT',
      'Someone corrected this entry in the meantime. Reload to see the newer version; nothing was recorded.',
    )
  }
  if (!mayAmend(ctx, found.unit.id, amended.row.recordedBy))
    throw new AppError('FORBIDDEN', 'Only the author of an entry or a physician can correct it.')
  return amended.row
}
