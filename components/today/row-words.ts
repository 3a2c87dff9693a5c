import { clockTime } from '@/lib/client/wall-clock'
import type { TodayRowDto } from '@/lib/schemas/today'
import { describeMove, type MoveWords } from '@/lib/weaning/describe-move'

/** The next move of a row in words, with the unit's clock. */
export function moveWords(row: TodayRowDto, timeZone: string, nowMs: number): MoveWords {
  return describeMove(row.move, (ms) => clockTime(ms, timeZone, nowMs), nowMs)
}

/** Who and what, without times. */
export function moveTitle(row: TodayRowDto): string {
  return describeMove(row.move, () => '').title
}
