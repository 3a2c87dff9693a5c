import 'server-only'
import { findHoldEndVersion, findHoldObservationVersion, findHoldVersion, findNewestHold, listHolds } from '@/db/queries/holds'
import { listScreensOfDay } from '@/db/queries/screens'
import { authorize } from '@/lib/access/door'
import type { Ctx } from '@/lib/server/ctx'
import type { HoldFormDto } from '@/lib/schemas/holds'
import type { StepFormQuery } from '@/lib/schemas/step-form'
import { AppError } from '@/lib/shared/errors'
import { toFormProtocolDto } from '../steps/judging-protocol'
import { mayHere, readStepForm } from '../steps/read-step-form'
import { readHolds } from './read-holds'
import { toHoldDto, toHoldEndDto, toHoldObservationDto, toRunningHoldDto } from './to-dto'

/** What the sedation hold's page shows: today's holds, the running one with its rules as judged now, and the entry to correct. */
export function readHoldForm(ctx: Ctx, query: StepFormQuery): HoldFormDto {
  const found = authorize(ctx, 'patient.read', { episodeId: query.episodeId })
  const { inForce, base } = readStepForm(ctx, found)
  const episodeId = found.episode.id
  const wantedId = query.amend === undefined ? null : holdIdOfVersion(ctx, query.amend)
  const holds = readHolds(
    ctx.db,
    episodeId,
    inForce,
    ({ row }, isRunning) => isRunning || row.ventilatorDay === base.ventilatorDay || row.entryId === wantedId,
  )
  const running = holds.find((one) => one.isRunning)
  const amended = query.amend === undefined ? null : findAmending(holds, query.amend, ctx.now)
  const lastWithInfusions = listHolds(ctx.db, episodeId).find(({ row }) => row.infusions.length > 0)
  const [screen] = listScreensOfDay(ctx.db, episodeId, base.ventilatorDay)
  const ended = holds.filter((one) => !one.isRunning && one.hold.row.ventilatorDay === base.ventilatorDay)
  return {
    ...base,
    protocol: toFormProtocolDto(amended?.protocolRow ?? running?.protocolRow ?? inForce),
    seenLatestId: findNewestHold(ctx.db, episodeId)?.row.id ?? null,
    latestScreen: screen
      ? { result: screen.row.result, observedAt: screen.row.observedAt, recordedByName: screen.recordedByName }
      : null,
    holds: ended.map((one) => toHoldDto(one, ctx.now)),
    running: running ? toRunningHoldDto(running, ctx.now) : null,
    lastInfusions: lastWithInfusions
      ? { observedAt: lastWithInfusions.row.observedAt, infusions: lastWithInfusions.row.infusions }
      : null,
    amending: amended?.amending ?? null,
    may: {
      start: mayHere(ctx.actor, found, 'hold.start'),
      observe: mayHere(ctx.actor, found, 'hold.observe'),
      end: mayHere(ctx.actor, found, 'hold.end'),
    },
  }
}

function holdIdOfVersion(ctx: Ctx, id: string): string | null {
  const start = findHoldVersion(ctx.db, id)
  if (start) return start.row.entryId
  return (findHoldObservationVersion(ctx.db, id) ?? findHoldEndVersion(ctx.db, id))?.row.holdId ?? null
}

/** The current version that the page was opened to correct. One of another episode, or no longer current, is not found. */
function findAmending(holds: ReturnType<typeof readHolds>, id: string, now: number) {
  for (const one of holds) {
    const { hold, observations, end, protocol, protocolRow } = one
    const holdId = hold.row.entryId
    if (hold.row.id === id) return { protocolRow, amending: { kind: 'start', hold: toHoldDto(one, now) } as const }
    const look = observations.find(({ row }) => row.id === id)
    if (look) return { protocolRow, amending: { kind: 'observation', observation: toHoldObservationDto(look), holdId } as const }
    if (end?.row.id === id) return { protocolRow, amending: { kind: 'end', end: toHoldEndDto(end, protocol), holdId } as const }
  }
  throw new AppError('NOT_FOUND', 'The entry to correct was not found. Someone may have corrected it already.')
}
