import 'server-only'
import type { Tx } from '@/db/client'
import { listHoldEnds, listHolds } from '@/db/queries/holds'
import { listScreensOfDay } from '@/db/queries/screens'
import { listTrialEnds, listTrials } from '@/db/queries/trials'
import type { TrialReadinessDto } from '@/lib/schemas/trials'
import { formatTime } from '@/lib/shared/format'
import { MINUTE_MS } from '@/lib/shared/time'
import { HOLD_OUTCOME_WORDS, SCREEN_RESULT_WORDS } from '@/lib/weaning/words'

type Moment = {
  ventilatorDay: string
  at: number
  timeZone: string
  now: number
  pairingWindowMin: number
  exceptTrialId?: string
}
/** Forms give whole minutes, so entries of the same minute count as before. */
const GRACE_MS = MINUTE_MS

/**
 * Whether the day's record leads to a breathing trial at a moment: the latest screen ready, the sedation hold tolerated or not needed, and
 * no failed trial since that screen. What is missing is named in words.
 */
export function readReadiness(tx: Tx, episodeId: string, moment: Moment): TrialReadinessDto {
  const isBefore = ({ row }: { row: { observedAt: number } }) => row.observedAt <= moment.at + GRACE_MS
  const time = (ms: number) => formatTime(ms, moment.timeZone, moment.now)
  const missing: string[] = []
  const screen = listScreensOfDay(tx, episodeId, moment.ventilatorDay).find(isBefore)
  if (!screen) missing.push('no screen is recorded today')
  else if (screen.row.result !== 'ready') {
    missing.push(`the screen at ${time(screen.row.observedAt)} is ${SCREEN_RESULT_WORDS[screen.row.result]}`)
  }
  const hold = listHolds(tx, episodeId).find((one) => one.row.ventilatorDay === moment.ventilatorDay && isBefore(one))
  const end = hold && listHoldEnds(tx, [hold.row.entryId])[0]
  if (!hold) missing.push('the sedation hold is not recorded today, not even as not needed')
  else if (hold.row.start === 'unsafe') missing.push(`the sedation hold was found unsafe at ${time(hold.row.observedAt)}`)
  else if (hold.row.start === 'started' && !end)
    missing.push(`the sedation hold started at ${time(hold.row.observedAt)} has no outcome yet`)
  else if (end && end.row.outcome !== 'tolerated') {
    missing.push(`the sedation hold ended at ${time(end.row.observedAt)}: ${HOLD_OUTCOME_WORDS[end.row.outcome]}`)
  }
  const failedAt = lastFailedTrial(tx, episodeId, moment)
  if (failedAt !== null && screen && screen.row.observedAt <= failedAt) {
    missing.push(`a trial failed at ${time(failedAt)} and no screen is recorded since`)
  }
  return {
    isInOrder: missing.length === 0,
    missing,
    screen: screen
      ? { result: screen.row.result, observedAt: screen.row.observedAt, recordedByName: screen.recordedByName }
      : null,
    hold: hold
      ? {
          start: hold.row.start,
          outcome: end?.row.outcome ?? null,
          observedAt: hold.row.observedAt,
          endedAt: end?.row.observedAt ?? null,
          recordedByName: hold.recordedByName,
        }
      : null,
    pairingWindowClosesMs: hold?.row.start === 'started' ? hold.row.observedAt + moment.pairingWindowMin * MINUTE_MS : null,
  }
}

function lastFailedTrial(tx: Tx, episodeId: string, moment: Moment): number | null {
  const today = listTrials(tx, episodeId).filter(
    ({ row }) => row.ventilatorDay === moment.ventilatorDay && row.entryId !== moment.exceptTrialId,
  )
  const failed = listTrialEnds(
    tx,
    today.map(({ row }) => row.entryId),
  ).filter(({ row }) => row.outcome === 'failed' && row.observedAt <= moment.at + GRACE_MS)
  return failed.length > 0 ? Math.max(...failed.map(({ row }) => row.observedAt)) : null
}
