import 'server-only'
import { findDecisionVersion, findNewestDecision, insertDecision } from '@/db/queries/decisions'
import { listTrialEnds, listTrials } from '@/db/queries/trials'
import type { Tx } from '@/db/client'
import { authorize, type EpisodeInUnit } from '@/lib/access/door'
import { writeAudit } from '@/lib/server/audit'
import { verifyOwnPassword } from '@/lib/server/auth'
import type { Ctx, PersonCtx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import { signedStatement } from '@/lib/schemas/decision-statement'
import type { SignDecisionInput, SignedDecisionDto } from '@/lib/schemas/decisions'
import { AppError, invalidField } from '@/lib/shared/errors'
import { formatDay, formatTime } from '@/lib/shared/format'
import { DECISION_WORDS } from '@/lib/weaning/words'
import { placeEntry } from '../entries/place-entry'
import { judgingProtocol } from '../steps/judging-protocol'
import { refuseUnseen } from '../steps/refuse-unseen'
import { toWallClock } from '../steps/to-wall-clock'
import { contentHash } from './content-hash'
import { gatherEvidence } from './gather-evidence'
import { resolveLookAgain } from './resolve-look-again'

type SignedInput = Omit<SignDecisionInput, 'password'>

/**
 * Signs a physician's decision after the password was given again: the choice and plan, the evidence that stood in the record, a statement in
 * words, and a hash over all three. Refused when the evidence has changed since the page showed it. The password is nowhere kept.
 */
export async function signDecision(ctx: Ctx, input: SignDecisionInput): Promise<SignedDecisionDto> {
  authorize(ctx, 'decision.sign', { episodeId: input.episodeId })
  const { password, ...signed } = input
  const person = requirePerson(ctx)
  if (!(await verifyOwnPassword(person, password))) {
    throw invalidField('password', 'This is not your password. Nothing was signed.')
  }
  // Checking a password takes a while; what the door hands out is read again, so that it is as the record stands now.
  const found = authorize(ctx, 'decision.sign', { episodeId: input.episodeId })
  return once(ctx, 'decision.sign', signed, (tx) => {
    refuseOutOfPlace(tx, found, signed, ctx.now)
    const { timeZone, name: unitName } = found.unit
    const { amends } = signed
    const earlier = amends ? findDecisionVersion(tx, amends.id) : undefined
    const placed = placeEntry(tx, ctx, found, { observed: toWallClock(ctx.now, timeZone), amends, findAmended: () => earlier })
    if (!amends) {
      const newest = findNewestDecision(tx, found.episode.id)
      const result = newest ? DECISION_WORDS[newest.row.choice] : ''
      refuseUnseen(newest, signed, { what: 'a decision', result, timeZone, now: ctx.now })
    }
    const evidence = gatherEvidence(tx, found, placed.protocol, ctx.now)
    if (contentHash(evidence) !== signed.seenEvidenceHash) {
      throw new AppError(
        'CONFLICT',
        'The record changed while you read it. Look at the evidence again, then sign. Nothing was signed.',
      )
    }
    const lookAgainAt = signed.lookAgain === null ? null : resolveLookAgain(signed.lookAgain, timeZone, ctx.now)
    const { choice, reasons, supportAfter, steroidsPlanned, note } = signed
    const lookAgainWords = lookAgainAt === null ? null : formatTime(lookAgainAt, timeZone, ctx.now)
    const { day, time } = toWallClock(ctx.now, timeZone)
    const statement = signedStatement(
      { choice, reasons, lookAgainWords, supportAfter, steroidsPlanned, note },
      { name: person.actor.name, unitName, timeWords: `${time} on ${formatDay(day)}` },
    )
    const plan = { reasons, lookAgainAt, supportAfter, steroidsPlanned, note }
    const row = insertDecision(tx, {
      ...placed.columns,
      observedAt: ctx.now,
      protocolVersionId: judgingProtocol(tx, earlier?.row.protocolVersionId, placed.protocol).id,
      choice,
      ...plan,
      evidence,
      contentHash: contentHash({ evidence, choice, plan, statement }),
      statement,
    })
    const action = amends ? 'decision.amend' : 'decision.sign'
    writeAudit(tx, ctx, { action, unitId: placed.columns.unitId, subject: { kind: 'decision', id: row.id }, after: row })
    return { id: row.id, choice, statement, contentHash: row.contentHash }
  })
}

function requirePerson(ctx: Ctx): PersonCtx {
  if (ctx.actor.kind !== 'person') throw new AppError('FORBIDDEN', 'Only a person can sign a decision.')
  return { ...ctx, actor: ctx.actor }
}

/** Nothing is left to decide after ventilation ended, and a running trial is ended before a decision to extubate on it. */
function refuseOutOfPlace(tx: Tx, { episode, unit }: EpisodeInUnit, { choice }: SignedInput, now: number): void {
  if (episode.endedAt !== null) {
    const at = formatTime(episode.endedAt, unit.timeZone, now)
    throw new AppError('PRECONDITION', `Ventilation ended at ${at}, so there is nothing left to decide. Nothing was signed.`)
  }
  if (choice === 'extubate' && isTrialRunning(tx, episode.id)) {
    throw new AppError(
      'PRECONDITION',
      'A breathing trial is running. Its end is recorded before a decision to extubate. Nothing was signed.',
    )
  }
}

export function isTrialRunning(tx: Tx, episodeId: string): boolean {
  const entryIds = listTrials(tx, episodeId).map(({ row }) => row.entryId)
  return listTrialEnds(tx, entryIds).length < entryIds.length
}
