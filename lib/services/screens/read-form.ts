import 'server-only'
import { findNamedScreen, findNewestScreen, listScreensOfDay } from '@/db/queries/screens'
import { authorize } from '@/lib/access/door'
import type { Ctx } from '@/lib/server/ctx'
import type { ScreenFormDto } from '@/lib/schemas/screens'
import type { StepFormQuery } from '@/lib/schemas/step-form'
import { AppError } from '@/lib/shared/errors'
import { judgingProtocol, toFormProtocolDto } from '../steps/judging-protocol'
import { mayAmend, mayHere, readStepForm } from '../steps/read-step-form'
import { toScreenDto } from './to-dto'

/** What the screen's page shows: the patient, the criteria, last known values, today's screens, and the entry to correct. */
export function readScreenForm(ctx: Ctx, query: StepFormQuery): ScreenFormDto {
  const found = authorize(ctx, 'patient.read', { episodeId: query.episodeId })
  const { inForce, base } = readStepForm(ctx, found)
  const amending = query.amend === undefined ? undefined : findNamedScreen(ctx.db, query.amend)
  if (query.amend !== undefined && amending?.row.episodeId !== found.episode.id) {
    throw new AppError('NOT_FOUND', 'The entry to correct was not found.')
  }
  return {
    ...base,
    protocol: toFormProtocolDto(judgingProtocol(ctx.db, amending?.row.protocolVersionId, inForce)),
    seenLatestId: findNewestScreen(ctx.db, found.episode.id)?.row.id ?? null,
    screens: listScreensOfDay(ctx.db, found.episode.id, base.ventilatorDay).map(toScreenDto),
    amending: amending ? toScreenDto(amending) : null,
    may: {
      record: mayHere(ctx.actor, found, 'screen.record'),
      amend: amending !== undefined && mayAmend(ctx.actor, found, 'screen.record', amending.row.recordedBy),
    },
  }
}
