import 'server-only'
import { findProtocolVersion } from '@/db/queries/protocols'
import { findPersonName } from '@/db/queries/steps'
import type { EpisodeInUnit } from '@/lib/access/door'
import type { Action } from '@/lib/access/policy'
import type { BedsideFormDto } from '@/lib/schemas/bedside-forms'
import type { Ctx } from '@/lib/server/ctx'
import { AppError } from '@/lib/shared/errors'
import { toEntryDto } from '../entries/to-entry-dto'
import { toFormProtocolDto } from './judging-protocol'
import { mayAmend, readStepForm } from './read-step-form'

type Version = Parameters<typeof toEntryDto>[0] & { episodeId: string; recordedBy: string; protocolVersionId: string }

/** What the forms of settings, gases and airway have in common. */
// no-door: each form's own read goes through the door and passes on what it handed out
export function readBedsideForm(ctx: Ctx, found: EpisodeInUnit): BedsideFormDto {
  const { inForce, base } = readStepForm(ctx, found)
  return { ...base, protocol: toFormProtocolDto(inForce) }
}

/** An entry's version with the names that its answer carries. */
// no-door: called by the read of each bedside form, which has gone through the door
export function nameVersion<Row extends Version>(ctx: Ctx, row: Row) {
  const number = findProtocolVersion(ctx.db, row.protocolVersionId)?.number ?? 0
  return toEntryDto(row, findPersonName(ctx.db, row.recordedBy) ?? '', number)
}

type Found<Row> = { row: Row; isSuperseded: boolean } | undefined

/** The current version that a form was opened to correct; null without one. Not found: of another episode, superseded, or not the reader's to correct. */
// no-door: called by the read of each bedside form, which has gone through the door
export function findAmending<Row extends Version>(
  ctx: Ctx,
  found: EpisodeInUnit,
  action: Action,
  amend: string | undefined,
  find: (id: string) => Found<Row>,
): Row | null {
  if (amend === undefined) return null
  const version = find(amend)
  if (
    !version ||
    version.isSuperseded ||
    version.row.episodeId !== found.episode.id ||
    !mayAmend(ctx.actor, found, action, version.row.recordedBy)
  ) {
    throw new AppError('NOT_FOUND', 'The entry to correct was not found. Someone may have corrected it already.')
  }
  return version.row
}
