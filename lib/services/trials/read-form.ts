import 'server-only'
import { findNewestTrial, findTrialEndVersion, findTrialObservationVersion, findTrialVersion } from '@/db/queries/trials'
import { authorize } from '@/lib/access/door'
import type { Ctx } from '@/lib/server/ctx'
import type { StepFormQuery } from '@/lib/schemas/step-form'
import type { TrialFormDto } from '@/lib/schemas/trials'
import { AppError } from '@/lib/shared/errors'
import { toFormProtocolDto } from '../steps/judging-protocol'
import { mayHere, readStepForm } from '../steps/read-step-form'
import { readTrials } from './read-trials'
import { readReadiness } from './readiness'
import { toRunningTrialDto, toTrialDto, toTrialEndDto, toTrialObservationDto } from './to-dto'

/** What the breathing trial's page shows: what leads to it, today's trials, the running one as judged now, and the entry to correct. */
export function readTrialForm(ctx: Ctx, query: StepFormQuery): TrialFormDto {
  const found = authorize(ctx, 'patient.read', { episodeId: query.episodeId })
  const { inForce, base } = readStepForm(ctx, found)
  const episodeId = found.episode.id
  const { isAdult } = base.patient
  const wantedId = query.amend === undefined ? null : trialIdOfVersion(ctx, query.amend)
  const trials = readTrials(
    ctx.db,
    episodeId,
    inForce,
    ({ row }, isRunning) => isRunning || row.ventilatorDay === base.ventilatorDay || row.entryId === wantedId,
  )
  const running = trials.find((one) => one.isRunning)
  const amended = query.amend === undefined ? null : findAmending(trials, query.amend, ctx.now, isAdult)
  const ended = trials.filter((one) => !one.isRunning && one.trial.row.ventilatorDay === base.ventilatorDay)
  return {
    ...base,
    protocol: toFormProtocolDto(amended?.protocolRow ?? running?.protocolRow ?? inForce),
    seenLatestId: findNewestTrial(ctx.db, episodeId)?.row.id ?? null,
    readiness: readReadiness(ctx.db, episodeId, {
      ventilatorDay: base.ventilatorDay,
      at: ctx.now,
      timeZone: found.unit.timeZone,
      now: ctx.now,
      pairingWindowMin: inForce.content.pairingWindowMin,
    }),
    trials: ended.map((one) => toTrialDto(one, ctx.now, isAdult)),
    running: running ? toRunningTrialDto(running, ctx.now, isAdult) : null,
    amending: amended?.amending ?? null,
    may: {
      start: mayHere(ctx.actor, found, 'trial.start'),
      observe: mayHere(ctx.actor, found, 'trial.observe'),
      end: mayHere(ctx.actor, found, 'trial.end'),
    },
  }
}

function trialIdOfVersion(ctx: Ctx, id: string): string | null {
  const start = findTrialVersion(ctx.db, id)
  if (start) return start.row.entryId
  return (findTrialObservationVersion(ctx.db, id) ?? findTrialEndVersion(ctx.db, id))?.row.trialId ?? null
}

/** The current version that the page was opened to correct. One of another episode, or no longer current, is not found. */
function findAmending(trials: ReturnType<typeof readTrials>, id: string, now: number, isAdult: boolean | null) {
  for (const one of trials) {
    const { trial, observations, end, protocol, protocolRow } = one
    const trialId = trial.row.entryId
    if (trial.row.id === id) return { protocolRow, amending: { kind: 'start', trial: toTrialDto(one, now, isAdult) } as const }
    const look = observations.find(({ row }) => row.id === id)
    if (look) {
      const observation = toTrialObservationDto(look, trial.row.observedAt, isAdult)
      return { protocolRow, amending: { kind: 'observation', observation, trialId } as const }
    }
    if (end?.row.id === id) return { protocolRow, amending: { kind: 'end', end: toTrialEndDto(end, protocol), trialId } as const }
  }
  throw new AppError('NOT_FOUND', 'The entry to correct was not found. Someone may have corrected it already.')
}
