import 'server-only'
import type { Tx } from '@/db/client'
import { listTrialEnds, listTrialObservations, listTrials, type NamedTrial } from '@/db/queries/trials'
import { groupBy } from '@/lib/shared/group-by'
import { judgingProtocol, type ProtocolRow } from '../steps/judging-protocol'

/** Trials of an episode with observations, end and judging protocol; latest start first. `isWanted` picks by day or state. */
export function readTrials(
  tx: Tx,
  episodeId: string,
  inForce: ProtocolRow,
  isWanted: (trial: NamedTrial, isRunning: boolean) => boolean,
) {
  const all = listTrials(tx, episodeId)
  const ends = new Map(
    listTrialEnds(
      tx,
      all.map(({ row }) => row.entryId),
    ).map((end) => [end.row.trialId, end]),
  )
  const isRunning = ({ row }: NamedTrial) => !ends.has(row.entryId)
  const wanted = all.filter((trial) => isWanted(trial, isRunning(trial)))
  const looks = groupBy(
    listTrialObservations(
      tx,
      wanted.map(({ row }) => row.entryId),
    ),
    ({ row }) => row.trialId,
  )
  return wanted.map((trial) => {
    const protocolRow = judgingProtocol(tx, trial.row.protocolVersionId, inForce)
    return {
      trial,
      observations: looks.get(trial.row.entryId) ?? [],
      end: ends.get(trial.row.entryId),
      isRunning: isRunning(trial),
      protocolRow,
      protocol: protocolRow.content,
    }
  })
}
