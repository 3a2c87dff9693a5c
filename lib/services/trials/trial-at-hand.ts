import 'server-only'
import type { Tx } from '@/db/client'
import { findProtocolVersion } from '@/db/queries/protocols'
import { findTrial, listTrialEnds, listTrialObservations, listTrials } from '@/db/queries/trials'
import { AppError } from '@/lib/shared/errors'
import type { Interval } from '../steps/refuse-overlap'

/** A trial of the episode, its observations, its end if any, and the protocol version that judges it from start to end. */
export function trialAtHand(tx: Tx, episodeId: string, trialId: string) {
  const trial = findTrial(tx, trialId)
  if (!trial || trial.row.episodeId !== episodeId) {
    throw new AppError('NOT_FOUND', 'This breathing trial was not found. Reload the page.')
  }
  const protocol = findProtocolVersion(tx, trial.row.protocolVersionId)
  if (!protocol) throw new Error('A protocol version that an entry names is missing.')
  const observations = listTrialObservations(tx, [trial.row.entryId])
  return { trial, observations, end: listTrialEnds(tx, [trial.row.entryId])[0], protocol }
}

/** When the episode's trials ran. */
export function listTrialIntervals(tx: Tx, episodeId: string): Interval[] {
  const all = listTrials(tx, episodeId)
  const ends = new Map(
    listTrialEnds(
      tx,
      all.map(({ row }) => row.entryId),
    ).map(({ row }) => [row.trialId, row.observedAt]),
  )
  return all.map(({ row, recordedByName }) => ({
    entryId: row.entryId,
    startMs: row.observedAt,
    endMs: ends.get(row.entryId) ?? null,
    recordedByName,
  }))
}
