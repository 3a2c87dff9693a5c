import 'server-only'
import type { Tx } from '@/db/client'
import { insertAirwayEvent } from '@/db/queries/airway-events'
import { insertEpisode, listEpisodesOfPatient } from '@/db/queries/episodes'
import { findOpenStay, findUnitAt } from '@/db/queries/stays'
import { authorize, type EpisodeRow, type PatientInUnit } from '@/lib/access/door'
import { isExtubation, type BeginEpisodeInput } from '@/lib/schemas/episodes'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import { AppError, invalidField } from '@/lib/shared/errors'
import { formatTime } from '@/lib/shared/format'
import { newId } from '@/lib/shared/ids'
import { HOUR_MS } from '@/lib/shared/time'
import { placeEntry } from '../entries/place-entry'
import { resolveObserved } from '../entries/resolve-observed'

/** A new tube this soon after an extubation is a reintubation, and is recorded as one: the window of the seven-day measure. */
const REINTUBATION_WITHIN_MS = 7 * 24 * HOUR_MS

/** Begins an episode of invasive ventilation with its airway event. Answers the episode's id. */
export function beginEpisode(ctx: Ctx, input: BeginEpisodeInput): { episodeId: string } {
  const found = authorize(ctx, 'episode.begin', { patientId: input.patientId })
  return once(ctx, 'episode.begin', input, (tx) => {
    if (ctx.actor.kind !== 'person') throw new AppError('FORBIDDEN', 'Only a person can record this.')
    const startedAt = resolveObserved(input.observed, found.unit.timeZone, ctx.now)
    refuseImpossibleStart(tx, ctx, found, input, startedAt)
    const episode = insertEpisode(tx, {
      id: newId(),
      patientId: found.patient.id,
      startedAt,
      start: input.start,
      airway: input.airway,
      recordedAt: ctx.now,
      recordedBy: ctx.actor.personId,
    })
    const { columns } = placeEntry(tx, ctx, { ...found, episode }, { observed: input.observed })
    insertAirwayEvent(tx, { ...columns, event: input.start })
    writeAudit(tx, ctx, {
      action: 'episode.begin',
      unitId: found.unit.id,
      subject: { kind: 'episode', id: episode.id },
      after: episode,
    })
    return { episodeId: episode.id }
  })
}

function refuseImpossibleStart(
  tx: Tx,
  ctx: Ctx,
  { patient, unit }: PatientInUnit,
  input: BeginEpisodeInput,
  startedAt: number,
): void {
  const say = (ms: number) => formatTime(ms, unit.timeZone, ctx.now)
  const stay = findOpenStay(tx, patient.id)
  if (!stay) throw new AppError('PRECONDITION', 'This patient is in no bed now. Admit the patient to a bed first.')
  const last = listEpisodesOfPatient(tx, patient.id).at(-1)
  if (last && last.endedAt === null) {
    throw new AppError(
      'CONFLICT',
      `Ventilation was already begun, at ${say(last.startedAt)}. Reload the page to see it; nothing was recorded.`,
    )
  }
  if (!findUnitAt(tx, patient.id, startedAt)) {
    throw invalidField(
      'observed.time',
      `The patient was in no bed here then; in this one since ${say(stay.startedAt)}. Give a later time.`,
    )
  }
  if (last && startedAt < (last.endedAt ?? 0)) {
    throw invalidField('observed.time', `The last ventilation ended at ${say(last.endedAt ?? 0)}. Give a later time.`)
  }
  refuseWrongStart(input.start, last, startedAt, say)
}

function refuseWrongStart(
  start: BeginEpisodeInput['start'],
  last: EpisodeRow | undefined,
  startedAt: number,
  say: (ms: number) => string,
): void {
  const extubatedAt = last && isExtubation(last.end) ? last.endedAt : null
  if (start === 'intubated' && extubatedAt !== null && startedAt - extubatedAt <= REINTUBATION_WITHIN_MS) {
    throw invalidField('start', `This patient was extubated at ${say(extubatedAt)}. Choose reintubated.`)
  }
  if (start === 'reintubated' && extubatedAt === null) {
    throw invalidField('start', 'No extubation of this patient is on record. Choose intubated, or arrived intubated.')
  }
}
