import 'server-only'
import type { Tx } from '@/db/client'
import { findDraft, findHighestProtocolNumber, insertProtocolVersion, updateDraft } from '@/db/queries/protocols'
import { findPersonName } from '@/db/queries/steps'
import { authorize } from '@/lib/access/door'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx, PersonActor } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import type { SaveDraftInput } from '@/lib/schemas/protocols'
import { AppError } from '@/lib/shared/errors'
import { newId } from '@/lib/shared/ids'

/** Saves the unit's one draft, new or changed. Refused when somebody else saved it since the form was opened. Answers its new version. */
export function saveDraft(ctx: Ctx, input: SaveDraftInput): { id: string; number: number; version: number } {
  const { unit } = authorize(ctx, 'protocol.draft', { unitId: input.unitId })
  const { actor } = ctx
  if (actor.kind !== 'person') throw new AppError('FORBIDDEN', 'Only a person can draft a protocol.')
  return once(ctx, 'protocol.draft', input, (tx) => {
    const before = findDraft(tx, unit.id)
    const after = before ? change(tx, ctx, actor, input, before) : create(tx, ctx, actor, input)
    const subject = { kind: 'protocol_version', id: after.id }
    writeAudit(tx, ctx, { action: 'protocol.draft', unitId: unit.id, subject, before: before ?? null, after })
    return { id: after.id, number: after.number, version: after.version }
  })
}

function change(
  tx: Tx,
  ctx: Ctx,
  actor: PersonActor,
  { version, content, note }: SaveDraftInput,
  before: NonNullable<ReturnType<typeof findDraft>>,
) {
  const stale = () => {
    const name = before.draftedBy === null ? 'Someone' : (findPersonName(tx, before.draftedBy) ?? 'Someone')
    return new AppError('CONFLICT', `${name} saved this draft in the meantime. Reload to see it; nothing was saved.`)
  }
  if (version !== before.version) throw stale()
  const after = updateDraft(tx, before, { content, note, draftedAt: ctx.now, draftedBy: actor.personId })
  if (!after) throw stale()
  return after
}

function create(tx: Tx, ctx: Ctx, actor: PersonActor, { unitId, version, content, note }: SaveDraftInput) {
  if (version !== null) {
    throw new AppError('CONFLICT', 'This draft was approved in the meantime. Reload to see the new version; nothing was saved.')
  }
  return insertProtocolVersion(tx, {
    id: newId(),
    unitId,
    number: findHighestProtocolNumber(tx, unitId) + 1,
    content,
    note,
    draftedAt: ctx.now,
    draftedBy: actor.personId,
  })
}
