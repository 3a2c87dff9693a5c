import 'server-only'
import { findGasVersion, insertGas } from '@/db/queries/gases'
import { authorize } from '@/lib/access/door'
import type { RecordGasInput } from '@/lib/schemas/gases'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import { placeEntry } from '../entries/place-entry'

/** Records an arterial blood gas with the FiO2 it was drawn at, or a correction of an earlier one. Answers the new version's id. */
export function recordGas(ctx: Ctx, input: RecordGasInput): { id: string } {
  const found = authorize(ctx, 'gas.record', { episodeId: input.episodeId })
  return once(ctx, 'gas.record', input, (tx) => {
    const { observed, amends, episodeId: _episodeId, confirmedUnlikely: _confirmed, ...values } = input
    const { columns } = placeEntry(tx, ctx, found, { observed, amends, findAmended: (id) => findGasVersion(tx, id) })
    const row = insertGas(tx, { ...columns, ...values })
    writeAudit(tx, ctx, {
      action: amends ? 'gas.amend' : 'gas.record',
      unitId: columns.unitId,
      subject: { kind: 'gas', id: row.id },
      after: row,
    })
    return { id: row.id }
  })
}
