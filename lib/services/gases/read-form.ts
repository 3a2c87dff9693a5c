import 'server-only'
import { findGasVersion } from '@/db/queries/gases'
import { authorize } from '@/lib/access/door'
import type { GasFormDto } from '@/lib/schemas/bedside-forms'
import type { StepFormQuery } from '@/lib/schemas/step-form'
import type { Ctx } from '@/lib/server/ctx'
import { findAmending, nameVersion, readBedsideForm } from '../steps/read-bedside-form'
import { mayHere } from '../steps/read-step-form'

/** What the form for a blood gas shows. */
export function readGasForm(ctx: Ctx, query: StepFormQuery): GasFormDto {
  const found = authorize(ctx, 'patient.read', { episodeId: query.episodeId })
  const row = findAmending(ctx, found, 'gas.record', query.amend, (id) => findGasVersion(ctx.db, id))
  const amending = row && {
    ...nameVersion(ctx, row),
    ph: row.ph,
    paCO2MmHg: row.paCO2MmHg,
    paO2MmHg: row.paO2MmHg,
    fio2Fraction: row.fio2Fraction,
    bicarbonateMmolPerL: row.bicarbonateMmolPerL,
    lactateMmolPerL: row.lactateMmolPerL,
    haemoglobinGPerDl: row.haemoglobinGPerDl,
  }
  return { ...readBedsideForm(ctx, found), amending, may: { record: mayHere(ctx.actor, found, 'gas.record') } }
}
