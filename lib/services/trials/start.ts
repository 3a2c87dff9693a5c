import 'server-only'
import type { Tx } from '@/db/client'
import { findNewestTrial, findTrialVersion, insertTrial, listTrialEnds, listTrialObservations } from '@/db/queries/trials'
import { authorize } from '@/lib/access/door'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import type { StartedTrialDto, StartTrialInput } from '@/lib/schemas/trials'
import { AppError, invalidField } from '@/lib/shared/errors'
import { formatTime } from '@/lib/shared/format'
import type { ProtocolContent } from '@/lib/weaning/protocol'
import { TECHNIQUE_WORDS } from '@/lib/weaning/words'
import { placeEntry } from '../entries/place-entry'
import { judgingProtocol } from '../steps/judging-protocol'
import { refuseOverlap } from '../steps/refuse-overlap'
import { refuseUnseen } from '../steps/refuse-unseen'
import { requireAdult } from '../steps/require-adult'
import { readReadiness } from './readiness'
import { listTrialIntervals } from './trial-at-hand'

/**
 * Records the start of a breathing trial with its technique, planned length (min) and baseline, or a correction of it. When the day's record
 * does not lead to a trial it takes a reason in words. One trial runs at a time.
 */
export function startTrial(ctx: Ctx, input: StartTrialInput): StartedTrialDto {
  const found = authorize(ctx, 'trial.start', { episodeId: input.episodeId })
  return once(ctx, 'trial.start', input, (tx) => {
    const { observed, amends } = input
    const earlier = amends ? findTrialVersion(tx, amends.id) : undefined
    const { columns, protocol } = placeEntry(tx, ctx, found, { observed, amends, findAmended: () => earlier })
    const judging = judgingProtocol(tx, earlier?.row.protocolVersionId, protocol)
    const words = { timeZone: found.unit.timeZone, now: ctx.now }
    const intervals = listTrialIntervals(tx, found.episode.id)
    const endMs = intervals.find((interval) => interval.entryId === columns.entryId)?.endMs ?? null
    refuseOverlap({ entryId: columns.entryId, startMs: columns.observedAt, endMs }, intervals, {
      what: 'a breathing trial',
      ...words,
    })
    requireAdult(found, columns.ventilatorDay)
    refuseLength(input.plannedDurationMin, judging.content.trial)
    if (amends) refuseAfterFirstLook(tx, columns, words)
    else {
      const newest = findNewestTrial(tx, found.episode.id)
      const result = newest ? TECHNIQUE_WORDS[newest.row.technique] : ''
      refuseUnseen(newest, input, { what: 'a breathing trial', result, ...words })
    }
    const pairingWindowMin = judging.content.pairingWindowMin
    const at = {
      ventilatorDay: columns.ventilatorDay,
      at: columns.observedAt,
      exceptTrialId: columns.entryId,
      pairingWindowMin,
      ...words,
    }
    const readiness = readReadiness(tx, found.episode.id, at)
    if (!readiness.isInOrder && input.startedAnywayBecause === null) refuseOutOfOrder(readiness.missing)
    const row = insertTrial(tx, {
      ...columns,
      protocolVersionId: judging.id,
      technique: input.technique,
      pressureSupportCmH2O: input.pressureSupportCmH2O,
      peepCmH2O: input.peepCmH2O,
      fio2Fraction: input.fio2Fraction,
      plannedDurationMin: input.plannedDurationMin,
      baseline: input.baseline,
      startedAnywayBecause: input.startedAnywayBecause,
    })
    const action = amends ? 'trial.amend' : 'trial.start'
    writeAudit(tx, ctx, { action, unitId: columns.unitId, subject: { kind: 'trial', id: row.id }, after: row })
    return { id: row.id, trialId: row.entryId }
  })
}

function refuseLength(plannedDurationMin: number, { shortestMin, longestMin }: ProtocolContent['trial']): void {
  if (plannedDurationMin >= shortestMin && plannedDurationMin <= longestMin) return
  throw invalidField(
    'plannedDurationMin',
    `The unit’s protocol plans ${shortestMin} to ${longestMin} min. Give a length within that.`,
  )
}

function refuseOutOfOrder(missing: string[]): never {
  throw new AppError(
    'PRECONDITION',
    `The day’s record does not lead to a trial yet: ${missing.join('; ')}. Record that first. If the trial starts all the same, say why. Nothing was recorded.`,
    { startedAnywayBecause: 'Say why the trial starts all the same.' },
  )
}

/** A corrected start still has to come before what was observed under it. */
function refuseAfterFirstLook(
  tx: Tx,
  { entryId, observedAt }: { entryId: string; observedAt: number },
  { timeZone, now }: { timeZone: string; now: number },
): void {
  const times = [...listTrialObservations(tx, [entryId]), ...listTrialEnds(tx, [entryId])].map(({ row }) => row.observedAt)
  const first = Math.min(...times)
  if (observedAt > first) {
    throw invalidField(
      'observed.time',
      `Something was observed at ${formatTime(first, timeZone, now)}. The trial started no later than that.`,
    )
  }
}
