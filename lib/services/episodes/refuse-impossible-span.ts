import 'server-only'
import type { Tx } from '@/db/client'
import { findObservedSpan, listEpisodesOfPatient } from '@/db/queries/episodes'
import { findOpenStay, findUnitAt } from '@/db/queries/stays'
import type { EpisodeInUnit } from '@/lib/access/door'
import type { Ctx } from '@/lib/server/ctx'
import { AppError, invalidField } from '@/lib/shared/errors'
import { formatTime } from '@/lib/shared/format'
import { MINUTE_MS } from '@/lib/shared/time'
import type { EpisodeEnd, EpisodeStart } from '@/lib/weaning/vocabulary'

type Span = { startedAt: number; start: EpisodeStart; endedAt: number | null; end: EpisodeEnd | null }

/** A corrected episode must hold all its entries, lie within the stay, keep clear of the other episodes, and fit its airway. */
export function refuseImpossibleSpan(tx: Tx, ctx: Ctx, { episode, patient, unit }: EpisodeInUnit, span: Span): void {
  const say = (ms: number) => formatTime(ms, unit.timeZone, ctx.now)
  const began = (message: string) => invalidField('began.observed.time', message)
  const ended = (message: string) => invalidField('ended.observed.time', message)
  const others = listEpisodesOfPatient(tx, patient.id).filter((other) => other.id !== episode.id)
  const previousEnd = Math.max(
    0,
    ...others.filter((other) => other.startedAt < episode.startedAt).map((other) => other.endedAt ?? 0),
  )
  const nextStart = Math.min(
    Infinity,
    ...others.filter((other) => other.startedAt >= episode.startedAt).map((other) => other.startedAt),
  )
  const entries = findObservedSpan(tx, episode.id)
  if (span.startedAt < previousEnd)
    throw began(`The ventilation before this one ended at ${say(previousEnd)}. Give a later time.`)
  if (!findUnitAt(tx, patient.id, span.startedAt)) throw began('The patient was in no bed here at that time. Give a later time.')
  if (entries && entries.firstMs < span.startedAt - MINUTE_MS)
    throw began(`An entry stands at ${say(entries.firstMs)}, before this time. Give an earlier time.`)
  if (span.endedAt === null) {
    if (Number.isFinite(nextStart))
      throw new AppError('PRECONDITION', 'Ventilation was begun again later, so this episode did end. Correct its time instead.')
    if (!findOpenStay(tx, patient.id))
      throw new AppError('PRECONDITION', 'The patient has left, so ventilation did end. Correct its time instead.')
    return
  }
  if (span.endedAt < span.startedAt) throw ended('This is before ventilation began. Give a later time.')
  if (span.endedAt > nextStart) throw ended(`Ventilation was begun again at ${say(nextStart)}. Give an earlier time.`)
  if (entries && entries.lastMs > span.endedAt + MINUTE_MS)
    throw ended(`An entry stands at ${say(entries.lastMs)}, after this time. Give a later time.`)
  if (
    (span.end === 'ventilator_off') !== (episode.airway === 'tracheostomy') &&
    span.end !== 'died' &&
    span.end !== 'left_hospital'
  ) {
    if (span.end !== 'accidentally_extubated')
      throw invalidField('ended.end', 'This end does not go with the airway on record. Choose another one.')
  }
}
