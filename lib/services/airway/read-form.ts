import 'server-only'
import { findAirwayEventVersion } from '@/db/queries/airway-events'
import { authorize } from '@/lib/access/door'
import type { AirwayFormDto } from '@/lib/schemas/bedside-forms'
import type { StepFormQuery } from '@/lib/schemas/step-form'
import type { Ctx } from '@/lib/server/ctx'
import { findAmending, nameVersion, readBedsideForm } from '../steps/read-bedside-form'
import { mayHere } from '../steps/read-step-form'

/** What the form for an airway event during ventilation shows. */
export function readAirwayForm(ctx: Ctx, query: StepFormQuery): AirwayFormDto {
  const found = authorize(ctx, 'patient.read', { episodeId: query.episodeId })
  const row = findAmending(ctx, found, 'airway.record', query.amend, (id) => findAirwayEventVersion(ctx.db, id))
  const amending = row && { ...nameVersion(ctx, row), event: row.event, reason: row.reason, supportAfter: row.supportAfter }
  return { ...readBedsideForm(ctx, found), amending, may: { record: mayHere(ctx.actor, found, 'airway.record') } }
}
