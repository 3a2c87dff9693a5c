import 'server-only'
import { findProtocolInForce, hasDrafted, listProtocolVersions } from '@/db/queries/protocols'
import { authorize } from '@/lib/access/door'
import { mayInUnit } from '@/lib/access/policy'
import type { Ctx } from '@/lib/server/ctx'
import type { ProtocolPageDto } from '@/lib/schemas/protocols'
import { AppError } from '@/lib/shared/errors'
import { localDay } from '@/lib/shared/time'
import { OWN_DRAFT } from './approve'
import { toProtocolVersionDto } from './to-dto'

/** The unit's protocol in force, what is approved for later, every earlier version, and the draft. */
export function readProtocol(ctx: Ctx, { unitId }: { unitId: string }): ProtocolPageDto {
  const { unit } = authorize(ctx, 'protocol.read', { unitId })
  const versions = listProtocolVersions(ctx.db, unit.id)
  const inForce = findProtocolInForce(ctx.db, unit.id, ctx.now)
  const current = versions.find(({ row }) => row.id === inForce?.id)
  if (!current) throw new AppError('PRECONDITION', 'This unit has no protocol yet. An administrator sets the unit up first.')
  const isDraft = ({ row }: (typeof versions)[number]) => row.approvedAt === null && !row.isDefault
  const isUpcoming = ({ row }: (typeof versions)[number]) => row.startsAt !== null && row.startsAt > ctx.now
  const settled = versions.filter((one) => !isDraft(one) && one.row.id !== current.row.id)
  const draft = versions.find(isDraft)
  const { actor } = ctx
  const memberships = actor.kind === 'person' ? actor.memberships : []
  const isDrafter =
    draft !== undefined &&
    actor.kind === 'person' &&
    (draft.row.draftedBy === actor.personId || hasDrafted(ctx.db, draft.row.id, actor.personId))
  const mayApprove = mayInUnit(memberships, 'protocol.approve', unit.id)
  return {
    unit: { id: unit.id, name: unit.name, timeZone: unit.timeZone },
    nowMs: ctx.now,
    day: localDay(ctx.now, unit.timeZone),
    current: toProtocolVersionDto(current),
    upcoming: settled
      .filter(isUpcoming)
      .sort((a, b) => (a.row.startsAt ?? 0) - (b.row.startsAt ?? 0))
      .map(toProtocolVersionDto),
    past: settled.filter((one) => !isUpcoming(one)).map(toProtocolVersionDto),
    draft: draft ? toProtocolVersionDto(draft) : null,
    may: { draft: mayInUnit(memberships, 'protocol.draft', unit.id), approve: mayApprove && draft !== undefined && !isDrafter },
    approveRefusal: mayApprove && isDrafter ? OWN_DRAFT : null,
  }
}
