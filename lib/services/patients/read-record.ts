import 'server-only'
import {
  listAllVersions,
  listPersonNames,
  listProtocolContents,
  listProtocolNumbers,
  type AllVersions,
} from '@/db/queries/patient-record'
import type { EpisodeRow, PatientInUnit } from '@/lib/access/door'
import { mayInUnit } from '@/lib/access/policy'
import type { PatientDayDto, RecordedDto } from '@/lib/schemas/patient-page'
import type { Ctx } from '@/lib/server/ctx'
import { groupBy } from '@/lib/shared/group-by'
import { localDay } from '@/lib/shared/time'
import { ventilatorDayNumber } from '@/lib/weaning/course/ventilator-day-number'
import { mayAmend } from '../entries/may-amend'
import { nameRules } from '../steps/judged-rules'
import { toRecorded } from './to-recorded'

/** All entries of an episode with their versions, named, and marked with what the reader may correct. */
// no-door: called by patients/read after its door
export function readRecord(ctx: Ctx, found: PatientInUnit, episodeId: string): RecordedDto[] {
  const all = listAllVersions(ctx.db, episodeId)
  const names = listPersonNames(
    ctx.db,
    distinct(all, (row) => row.recordedBy),
  )
  const numbers = listProtocolNumbers(
    ctx.db,
    distinct(all, (row) => row.protocolVersionId),
  )
  const judging = listProtocolContents(
    ctx.db,
    distinctOf([...all.holdEnd, ...all.trialEnd], (row) => row.protocolVersionId),
  )
  const { actor } = ctx
  return toRecorded(all, {
    personName: (id) => names.get(id) ?? 'Unknown',
    protocolNumber: (id) => numbers.get(id) ?? 0,
    ruleWords: (step, id, ruleIds) => {
      const content = judging.get(id)
      const rules = step === 'hold' ? content?.hold.failRules : content?.trial.stopRules
      return nameRules(rules ?? [], ruleIds).map(({ words }) => words)
    },
    mayAmend: (action, recordedBy) =>
      !found.isOpening &&
      actor.kind === 'person' &&
      mayInUnit(actor.memberships, action, found.unit.id) &&
      mayAmend(ctx, found.unit.id, recordedBy),
  })
}

type AnyVersion = { recordedBy: string; protocolVersionId: string }

function distinct(all: AllVersions, pick: (row: AnyVersion) => string): string[] {
  return distinctOf(Object.values(all).flat(), pick)
}

function distinctOf(rows: readonly AnyVersion[], pick: (row: AnyVersion) => string): string[] {
  return [...new Set(rows.map(pick))]
}

/** The entries by ventilator day, newest day and newest entry first. Days after the end of ventilation have no number. */
export function toPatientDays(recorded: RecordedDto[], episode: EpisodeRow, timeZone: string): PatientDayDto[] {
  const firstDay = localDay(episode.startedAt, timeZone)
  const lastDay = episode.endedAt === null ? null : localDay(episode.endedAt, timeZone)
  return [...groupBy(recorded, (one) => one.entry.ventilatorDay)]
    .sort(([a], [b]) => b.localeCompare(a))
    .map(([day, entries]) => ({
      day,
      dayNumber: lastDay === null || day <= lastDay ? ventilatorDayNumber(firstDay, day) : null,
      entries: [...entries].sort((a, b) => b.entry.observedAt - a.entry.observedAt || b.entry.recordedAt - a.entry.recordedAt),
    }))
}
