import 'server-only'
import type { Tx } from '@/db/client'
import { listHoldEnds, listHoldObservations, listHolds, type NamedHold } from '@/db/queries/holds'
import { groupBy } from '@/lib/shared/group-by'
import { judgingProtocol, type ProtocolRow } from '../steps/judging-protocol'

/** Holds of an episode with observations, end and judging protocol; latest start first. `isWanted` picks by day or state. */
export function readHolds(
  tx: Tx,
  episodeId: string,
  inForce: ProtocolRow,
  isWanted: (hold: NamedHold, isRunning: boolean) => boolean,
) {
  const all = listHolds(tx, episodeId)
  const ends = new Map(
    listHoldEnds(
      tx,
      all.map(({ row }) => row.entryId),
    ).map((end) => [end.row.holdId, end]),
  )
  const isRunning = ({ row }: NamedHold) => row.start === 'started' && !ends.has(row.entryId)
  const wanted = all.filter((hold) => isWanted(hold, isRunning(hold)))
  const looks = groupBy(
    listHoldObservations(
      tx,
      wanted.map(({ row }) => row.entryId),
    ),
    ({ row }) => row.holdId,
  )
  return wanted.map((hold) => {
    const protocolRow = judgingProtocol(tx, hold.row.protocolVersionId, inForce)
    return {
      hold,
      observations: looks.get(hold.row.entryId) ?? [],
      end: ends.get(hold.row.entryId),
      isRunning: isRunning(hold),
      protocolRow,
      protocol: protocolRow.content,
    }
  })
}
