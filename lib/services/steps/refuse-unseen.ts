import { AppError } from '@/lib/shared/errors'
import { formatTime } from '@/lib/shared/format'

type Newest = { row: { id: string; observedAt: number }; recordedByName: string } | undefined

/**
 * Two people at the same step: refuses when the newest entry of its kind is not the one that the form showed, and says who, when and
 * what. `recordAnyway` lets the second one in beside the first.
 */
export function refuseUnseen(
  newest: Newest,
  seen: { seenLatestId: string | null; recordAnyway?: boolean | undefined },
  words: { what: string; result: string; timeZone: string; now: number },
): void {
  if (!newest || newest.row.id === seen.seenLatestId || seen.recordAnyway === true) return
  const at = formatTime(newest.row.observedAt, words.timeZone, words.now)
  throw new AppError(
    'CONFLICT',
    `${newest.recordedByName} recorded ${words.what} in the meantime, at ${at}: ${words.result}. Look at it first; you can then record yours as well. Nothing was recorded.`,
  )
}
