import 'server-only'
import { findSettingsVersion, insertSettings } from '@/db/queries/settings'
import { authorize } from '@/lib/access/door'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import type { RecordSettingsInput } from '@/lib/schemas/settings'
import { placeEntry } from '../entries/place-entry'

/** Records the ventilator settings of a moment, or a correction of earlier ones. Answers the new version's id. */
export function recordSettings(ctx: Ctx, input: RecordSettingsInput): { id: string } {
  const found = authorize(ctx, 'settings.record', { episodeId: input.episodeId })
  return once(ctx, 'settings.record', input, (tx) => {
    const { observed, amends, episodeId: _episodeId, confirmedUnlikely: _confirmed, ...values } = input
    const { columns } = placeEntry(tx, ctx, found, { observed, amends, findAmended: (id) => findSettingsVersion(tx, id) })
    const row = insertSettings(tx, { ...columns, ...values })
    writeAudit(tx, ctx, {
      action: amends ? 'settings.amend' : 'settings.record',
      unitId: columns.unitId,
      subject: { kind: 'settings', id: row.id },
      after: row,
    })
    return { id: row.id }
  })
}
