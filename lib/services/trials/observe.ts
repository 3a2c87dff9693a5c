import 'server-only'
import { findTrialObservationVersion, insertTrialObservation, listTrialObservations } from '@/db/queries/trials'
import { authorize } from '@/lib/access/door'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import type { ObservedTrialDto, ObserveTrialInput } from '@/lib/schemas/trials'
import { AppError } from '@/lib/shared/errors'
import { placeEntry } from '../entries/place-entry'
import { idsOfRulesMet } from '../steps/judged-rules'
import { refuseOutsideStep } from '../steps/refuse-outside-step'
import { trialAtHand } from './trial-at-hand'

/** Records one look at the patient during a trial, or a correction of one. Answers the stop rules that are met with it. */
export function observeTrial(ctx: Ctx, input: ObserveTrialInput): ObservedTrialDto {
  const found = authorize(ctx, 'trial.observe', { episodeId: input.episodeId })
  return once(ctx, 'trial.observe', input, (tx) => {
    const { observed, amends, readings } = input
    const { trial, end, protocol } = trialAtHand(tx, found.episode.id, input.trialId)
    const earlier = amends ? findTrialObservationVersion(tx, amends.id) : undefined
    if (earlier && earlier.row.trialId !== trial.row.entryId)
      throw new AppError('NOT_FOUND', 'The entry to correct was not found.')
    const { columns } = placeEntry(tx, ctx, found, { observed, amends, findAmended: () => earlier })
    const step = { startMs: trial.row.observedAt, endMs: end?.row.observedAt ?? null }
    refuseOutsideStep(columns.observedAt, step, { what: 'trial', timeZone: found.unit.timeZone, now: ctx.now })
    const row = insertTrialObservation(tx, { ...columns, protocolVersionId: protocol.id, trialId: trial.row.entryId, readings })
    const action = amends ? 'trial.amend_observation' : 'trial.observe'
    writeAudit(tx, ctx, { action, unitId: columns.unitId, subject: { kind: 'trial_observation', id: row.id }, after: row })
    const looks = listTrialObservations(tx, [trial.row.entryId])
    return {
      id: row.id,
      rulesMet: idsOfRulesMet(protocol.content.trial.stopRules, trial.row.baseline, looks, Math.max(ctx.now, columns.observedAt)),
    }
  })
}
