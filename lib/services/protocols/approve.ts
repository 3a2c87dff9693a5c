import 'server-only'
import { findProtocolVersion, hasDrafted, updateDraft } from '@/db/queries/protocols'
import { authorize } from '@/lib/access/door'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import type { ApproveProtocolInput } from '@/lib/schemas/protocols'
import { protocolContentSchema } from '@/lib/schemas/protocol-content'
import { AppError, invalidField } from '@/lib/shared/errors'
import { formatDay } from '@/lib/shared/format'
import { localDay, shiftDay, wallClockMs } from '@/lib/shared/time'

export const OWN_DRAFT = 'You drafted this version, so another physician of the unit approves it.'
const LATEST_START_DAYS = 365

/**
 * A physician puts the unit's draft in force, from now on or from the first minute of a later day. Whoever drafted any part of it cannot
 * approve it. From then on the version never changes.
 */
export function approveProtocol(ctx: Ctx, input: ApproveProtocolInput): { id: string; number: number; startsAt: number } {
  const { unit } = authorize(ctx, 'protocol.approve', { unitId: input.unitId })
  const { actor } = ctx
  if (actor.kind !== 'person') throw new AppError('FORBIDDEN', 'Only a person can approve a protocol.')
  refuseOwnDraft(ctx, actor.personId, input, unit.id)
  return once(ctx, 'protocol.approve', input, (tx) => {
    const draft = findProtocolVersion(tx, input.draftId)
    if (!draft || draft.unitId !== unit.id || draft.isDefault) throw new AppError('NOT_FOUND', 'This draft was not found.')
    if (draft.approvedAt !== null) {
      throw new AppError(
        'CONFLICT',
        `Version ${draft.number} was approved in the meantime. Reload to see it; nothing was changed.`,
      )
    }
    // A draft saved under earlier sense checks must still pass today's.
    if (!protocolContentSchema.safeParse(draft.content).success) {
      throw new AppError(
        'PRECONDITION',
        'This draft no longer passes the checks. The unit lead opens it and saves it again first.',
      )
    }
    const startsAt = input.startDay === null ? ctx.now : resolveStart(input.startDay, unit.timeZone, ctx.now)
    const note = input.note ? `${draft.note}\nOn approval: ${input.note}` : draft.note
    const approved = updateDraft(
      tx,
      { id: draft.id, version: input.version },
      { approvedAt: ctx.now, approvedBy: actor.personId, startsAt, note },
    )
    if (!approved)
      throw new AppError('CONFLICT', 'The draft changed since you read it. Reload and read it again; nothing was approved.')
    const subject = { kind: 'protocol_version', id: approved.id }
    writeAudit(tx, ctx, { action: 'protocol.approve', unitId: unit.id, subject, before: draft, after: approved })
    return { id: approved.id, number: approved.number, startsAt }
  })
}

/** Stands before the transaction, so that the refusal itself is logged; a draft saved in between no longer has the version that was read. */
function refuseOwnDraft(ctx: Ctx, personId: string, { draftId }: ApproveProtocolInput, unitId: string): void {
  const draft = findProtocolVersion(ctx.db, draftId)
  if (draft?.draftedBy !== personId && !hasDrafted(ctx.db, draftId, personId)) return
  ctx.db.transaction(
    (tx) => {
      const subject = { kind: 'protocol_version', id: draftId }
      writeAudit(tx, ctx, { action: 'access.denied', unitId, subject, after: { asked: 'protocol.approve', code: 'FORBIDDEN' } })
    },
    { behavior: 'immediate' },
  )
  throw new AppError('FORBIDDEN', OWN_DRAFT)
}

function resolveStart(startDay: string, timeZone: string, now: number): number {
  const asDate = new Date(`${startDay}T00:00:00Z`)
  if (Number.isNaN(asDate.getTime()) || asDate.toISOString().slice(0, 10) !== startDay) {
    throw invalidField('startDay', 'This day does not exist. Give it as year-month-day, such as 2026-12-01.')
  }
  const today = localDay(now, timeZone)
  if (startDay <= today) {
    throw invalidField('startDay', 'Give a day after today, or let it start now. A protocol never starts in the past.')
  }
  const latest = shiftDay(today, LATEST_START_DAYS)
  if (startDay > latest) throw invalidField('startDay', `Give a day up to ${formatDay(latest)}.`)
  return wallClockMs(startDay, 0, timeZone)
}
