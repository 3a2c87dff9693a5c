import 'server-only'
import { findHoldObservationVersion, insertHoldObservation, listHoldObservations } from '@/db/queries/holds'
import { authorize } from '@/lib/access/door'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import type { ObservedHoldDto, ObserveHoldInput } from '@/lib/schemas/holds'
import { AppError } from '@/lib/shared/errors'
import { placeEntry } from '../entries/place-entry'
import { idsOfRulesMet } from '../steps/judged-rules'
import { refuseOutsideStep } from '../steps/refuse-outside-step'
import { holdAtHand } from './hold-at-hand'

/** Records one look at the patient during a hold, or a correction of one. Answers the fail rules that are met with it. */
export function observeHold(ctx: Ctx, input: ObserveHoldInput): ObservedHoldDto {
  const found = authorize(ctx, 'hold.observe', { episodeId: input.episodeId })
  return once(ctx, 'hold.observe', input, (tx) => {
    const { observed, amends, readings, opensEyesToVoice } = input
    const { hold, end, protocol } = holdAtHand(tx, found.episode.id, input.holdId)
    const earlier = amends ? findHoldObservationVersion(tx, amends.id) : undefined
    if (earlier && earlier.row.holdId !== hold.row.entryId) throw new AppError('NOT_FOUND', 'The entry to correct was not found.')
    const { columns } = placeEntry(tx, ctx, found, { observed, amends, findAmended: () => earlier })
    const step = { startMs: hold.row.observedAt, endMs: end?.row.observedAt ?? null }
    refuseOutsideStep(columns.observedAt, step, { what: 'hold', timeZone: found.unit.timeZone, now: ctx.now })
    const row = insertHoldObservation(tx, {
      ...columns,
      protocolVersionId: protocol.id,
      holdId: hold.row.entryId,
      readings,
      opensEyesToVoice,
    })
    const action = amends ? 'hold.amend_observation' : 'hold.observe'
    writeAudit(tx, ctx, { action, unitId: columns.unitId, subject: { kind: 'hold_observation', id: row.id }, after: row })
    const looks = listHoldObservations(tx, [hold.row.entryId])
    return {
      id: row.id,
      rulesMet: idsOfRulesMet(protocol.content.hold.failRules, null, looks, Math.max(ctx.now, columns.observedAt)),
    }
  })
}
