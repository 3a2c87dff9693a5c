import 'server-only'
import { findLatestSettings, findSettingsVersion } from '@/db/queries/settings'
import type { settings } from '@/db/schema'
import { authorize } from '@/lib/access/door'
import type { SettingsFormDto } from '@/lib/schemas/bedside-forms'
import type { SettingsDto } from '@/lib/schemas/settings'
import type { StepFormQuery } from '@/lib/schemas/step-form'
import type { Ctx } from '@/lib/server/ctx'
import { findAmending, nameVersion, readBedsideForm } from '../steps/read-bedside-form'
import { mayHere } from '../steps/read-step-form'
import { toSettingsValues } from './to-values'

/** What the form for ventilator settings shows. */
export function readSettingsForm(ctx: Ctx, query: StepFormQuery): SettingsFormDto {
  const found = authorize(ctx, 'patient.read', { episodeId: query.episodeId })
  const amending = findAmending(ctx, found, 'settings.record', query.amend, (id) => findSettingsVersion(ctx.db, id))
  const latest = findLatestSettings(ctx.db, found.episode.id)
  return {
    ...readBedsideForm(ctx, found),
    latest: latest ? toSettingsDto(ctx, latest) : null,
    amending: amending ? toSettingsDto(ctx, amending) : null,
    may: { record: mayHere(ctx.actor, found, 'settings.record') },
  }
}

function toSettingsDto(ctx: Ctx, row: typeof settings.$inferSelect): SettingsDto {
  return { ...nameVersion(ctx, row), ...toSettingsValues(row) }
}
