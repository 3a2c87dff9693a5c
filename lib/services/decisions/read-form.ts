import 'server-only'
import { findNamedDecision, findNewestDecision, listDecisionsOfDay } from '@/db/queries/decisions'
import { authorize } from '@/lib/access/door'
import type { Ctx } from '@/lib/server/ctx'
import type { DecisionFormDto } from '@/lib/schemas/decisions'
import type { StepFormQuery } from '@/lib/schemas/step-form'
import { AppError } from '@/lib/shared/errors'
import { judgingProtocol, toFormProtocolDto } from '../steps/judging-protocol'
import { mayHere, readStepForm } from '../steps/read-step-form'
import { contentHash } from './content-hash'
import { gatherEvidence, listMissing } from './gather-evidence'
import { isTrialRunning } from './sign'
import { toDecisionDto } from './to-dto'

/** What the decision's page shows: the evidence with its hash, what is missing, today's decisions, and the decision to correct. */
export function readDecisionForm(ctx: Ctx, query: StepFormQuery): DecisionFormDto {
  const found = authorize(ctx, 'patient.read', { episodeId: query.episodeId })
  const { inForce, base } = readStepForm(ctx, found)
  const episodeId = found.episode.id
  const amending = query.amend === undefined ? undefined : findNamedDecision(ctx.db, query.amend)
  if (query.amend !== undefined && amending?.row.episodeId !== episodeId) {
    throw new AppError('NOT_FOUND', 'The entry to correct was not found.')
  }
  const evidence = gatherEvidence(ctx.db, found, inForce, ctx.now)
  return {
    ...base,
    protocol: toFormProtocolDto(judgingProtocol(ctx.db, amending?.row.protocolVersionId, inForce)),
    seenLatestId: findNewestDecision(ctx.db, episodeId)?.row.id ?? null,
    evidence,
    evidenceHash: contentHash(evidence),
    missing: listMissing(evidence),
    isTrialRunning: isTrialRunning(ctx.db, episodeId),
    decisions: listDecisionsOfDay(ctx.db, episodeId, base.ventilatorDay).map(toDecisionDto),
    amending: amending ? toDecisionDto(amending) : null,
    signerName: ctx.actor.kind === 'person' ? ctx.actor.name : '',
    may: { sign: mayHere(ctx.actor, found, 'decision.sign') },
  }
}
