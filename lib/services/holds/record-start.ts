import 'server-only'
import type { Tx } from '@/db/client'
import { findHoldVersion, findNewestHold, insertHold, listHoldEnds, listHoldObservations } from '@/db/queries/holds'
import { authorize } from '@/lib/access/door'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import type { StartedHoldDto, StartHoldInput } from '@/lib/schemas/holds'
import { AppError, invalidField } from '@/lib/shared/errors'
import { formatTime } from '@/lib/shared/format'
import { judgeSafety } from '@/lib/weaning/hold/judge-safety'
import type { HoldSafetyItem } from '@/lib/weaning/vocabulary'
import { HOLD_START_WORDS } from '@/lib/weaning/words'
import { placeEntry } from '../entries/place-entry'
import { judgingProtocol } from '../steps/judging-protocol'
import { refuseOverlap } from '../steps/refuse-overlap'
import { refuseUnseen } from '../steps/refuse-unseen'
import { requireAdult } from '../steps/require-adult'
import { listHoldIntervals } from './hold-at-hand'

/**
 * Records that a sedation hold is not needed, is unsafe (with what makes it so), or has started. A hold starts only when every safety item
 * of the protocol is answered with no, and only one runs at a time.
 */
export function recordHoldStart(ctx: Ctx, input: StartHoldInput): StartedHoldDto {
  const found = authorize(ctx, 'hold.start', { episodeId: input.episodeId })
  return once(ctx, 'hold.start', input, (tx) => {
    const { observed, amends, start } = input
    const earlier = amends ? findHoldVersion(tx, amends.id) : undefined
    const { columns, protocol } = placeEntry(tx, ctx, found, { observed, amends, findAmended: () => earlier })
    const judging = judgingProtocol(tx, earlier?.row.protocolVersionId, protocol)
    const words = { timeZone: found.unit.timeZone, now: ctx.now }
    const intervals = listHoldIntervals(tx, found.episode.id)
    if (start === 'started') {
      const endMs = intervals.find((interval) => interval.entryId === columns.entryId)?.endMs ?? null
      refuseOverlap({ entryId: columns.entryId, startMs: columns.observedAt, endMs }, intervals, {
        what: 'a sedation hold',
        ...words,
      })
      requireAdult(found, columns.ventilatorDay)
      requireSafe(judging.content.hold.safetyItems, input.safety)
    } else if (!amends) {
      refuseWhileRunning(intervals, columns.observedAt, words)
    }
    if (amends) refuseUnderChildren(tx, columns, start, words)
    else {
      const newest = findNewestHold(tx, found.episode.id)
      const result = newest ? HOLD_START_WORDS[newest.row.start] : ''
      refuseUnseen(newest, input, { what: 'a sedation hold', result, ...words })
    }
    const { safety, infusions, note } = input
    const row = insertHold(tx, { ...columns, protocolVersionId: judging.id, start, safety, infusions, note })
    const action = amends ? 'hold.amend' : 'hold.start'
    writeAudit(tx, ctx, { action, unitId: columns.unitId, subject: { kind: 'hold', id: row.id }, after: row })
    return { id: row.id, holdId: row.entryId, start: row.start }
  })
}

function requireSafe(items: readonly HoldSafetyItem[], answers: StartHoldInput['safety']): void {
  const { result, present, notAssessed } = judgeSafety(items, answers ?? {})
  if (result === 'safe') return
  const fields = [
    ...present.map((item) => [`safety.${item}`, 'With this present the hold is unsafe. Record it as unsafe instead.']),
    ...notAssessed.map((item) => [`safety.${item}`, 'Answer yes or no. What is not assessed does not count as safe.']),
  ]
  throw new AppError('INVALID', 'Please look at the safety screen. Nothing was recorded.', Object.fromEntries(fields))
}

/** While a hold runs, "not needed" and "unsafe" at the same time would contradict it. */
function refuseWhileRunning(
  intervals: ReturnType<typeof listHoldIntervals>,
  at: number,
  { timeZone, now }: { timeZone: string; now: number },
): void {
  const running = intervals.find(({ startMs, endMs }) => endMs === null && startMs <= at)
  if (!running) return
  const since = formatTime(running.startMs, timeZone, now)
  throw new AppError(
    'PRECONDITION',
    `A sedation hold has been running since ${since} (${running.recordedByName}). Record its end first. Nothing was recorded.`,
  )
}

/** A corrected start still has to fit what was observed under it. */
function refuseUnderChildren(
  tx: Tx,
  { entryId, observedAt }: { entryId: string; observedAt: number },
  start: StartHoldInput['start'],
  { timeZone, now }: { timeZone: string; now: number },
): void {
  const times = [...listHoldObservations(tx, [entryId]), ...listHoldEnds(tx, [entryId])].map(({ row }) => row.observedAt)
  if (times.length === 0) return
  if (start !== 'started') {
    throw new AppError('PRECONDITION', 'Observations or an end stand under this hold, so it did start. Nothing was recorded.')
  }
  const first = Math.min(...times)
  if (observedAt > first) {
    throw invalidField(
      'observed.time',
      `Something was observed at ${formatTime(first, timeZone, now)}. The hold started no later than that.`,
    )
  }
}
