import 'server-only'
import type { Tx } from '@/db/client'
import { findHold, listHoldEnds, listHoldObservations, listHolds } from '@/db/queries/holds'
import { findProtocolVersion } from '@/db/queries/protocols'
import { AppError } from '@/lib/shared/errors'
import type { Interval } from '../steps/refuse-overlap'

/** A hold of the episode that was started, its observations, its end if any, and the protocol version that judges it from start to end. */
export function holdAtHand(tx: Tx, episodeId: string, holdId: string) {
  const hold = findHold(tx, holdId)
  if (!hold || hold.row.episodeId !== episodeId || hold.row.start !== 'started') {
    throw new AppError('NOT_FOUND', 'This sedation hold was not found. It may have been corrected; reload the page.')
  }
  const protocol = findProtocolVersion(tx, hold.row.protocolVersionId)
  if (!protocol) throw new Error('A protocol version that an entry names is missing.')
  const observations = listHoldObservations(tx, [hold.row.entryId])
  return { hold, observations, end: listHoldEnds(tx, [hold.row.entryId])[0], protocol }
}

/** When the episode's started holds ran. */
export function listHoldIntervals(tx: Tx, episodeId: string): Interval[] {
  const started = listHolds(tx, episodeId).filter(({ row }) => row.start === 'started')
  const entryIds = started.map(({ row }) => row.entryId)
  const ends = new Map(listHoldEnds(tx, entryIds).map(({ row }) => [row.holdId, row.observedAt]))
  return started.map(({ row, recordedByName }) => ({
    entryId: row.entryId,
    startMs: row.observedAt,
    endMs: ends.get(row.entryId) ?? null,
    recordedByName,
  }))
}
