import 'server-only'
import { findValidOpening } from '@/db/queries/access'
import { listEpisodesOfPatient } from '@/db/queries/episodes'
import { findBedLabel } from '@/db/queries/steps'
import { authorize, type EpisodeRow, type PatientInUnit } from '@/lib/access/door'
import { mayInUnit } from '@/lib/access/policy'
import type { GasDto } from '@/lib/schemas/gases'
import type { PatientPageDto, RecordedDto } from '@/lib/schemas/patient-page'
import { PATIENT_ACTIONS, type PatientActions } from '@/lib/schemas/patients'
import type { SettingsDto } from '@/lib/schemas/settings'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { AppError } from '@/lib/shared/errors'
import { localDay, wallClockMs } from '@/lib/shared/time'
import { ventilatorDayNumber } from '@/lib/weaning/course/ventilator-day-number'
import { nextMove } from '@/lib/weaning/next-move'
import { toEpisodeDto } from '../episodes/to-episode-dto'
import { makeDayClock } from '../today/day-clock'
import { findUnitProtocol } from '../today/find-unit-protocol'
import { moveHref } from '../today/move-href'
import { readDayRecord } from '../today/read-next-move'
import { toDayTrack } from '../today/to-day-track'
import { readRecord, toPatientDays } from './read-record'
import { toBodyDto, toPatientHead, toTidalVolumePerKg } from './to-patient-head'
import { toTrends } from './to-trends'

/**
 * Everything that the patient page shows of one episode: the open one, else the last, else the one asked for. A reader from outside the unit
 * comes through a record opening, and each of these reads leaves its audit row.
 */
export function readPatient(ctx: Ctx, input: { patientId: string; episodeId?: string | undefined }): PatientPageDto {
  const found = authorize(ctx, 'patient.read', { patientId: input.patientId })
  if (found.isOpening) auditOpening(ctx, found)
  const { patient, stay, unit } = found
  const today = localDay(ctx.now, unit.timeZone)
  const episodes = listEpisodesOfPatient(ctx.db, patient.id)
  const episode = input.episodeId === undefined ? episodes.at(-1) : episodes.find((one) => one.id === input.episodeId)
  if (input.episodeId !== undefined && !episode) throw new AppError('NOT_FOUND', 'This episode of ventilation was not found.')
  const recorded = episode ? readRecord(ctx, found, episode.id) : []
  const head = toPatientHead(patient, today)
  const body = toBodyDto(patient, head.isAdult)
  const latest = { settings: latestSettings(recorded), gas: latestGas(recorded) }
  return {
    nowMs: ctx.now,
    unit: {
      id: unit.id,
      name: unit.name,
      timeZone: unit.timeZone,
      dayTrackFromHour: unit.dayTrackFromHour,
      dayTrackToHour: unit.dayTrackToHour,
    },
    isOpening: found.isOpening,
    openUntil: openUntil(ctx, found),
    patient: head,
    ...body,
    stay: {
      id: stay.id,
      bedId: stay.bedId,
      bedLabel: findBedLabel(ctx.db, stay.bedId) ?? '',
      startedAt: stay.startedAt,
      endedAt: stay.endedAt,
      end: stay.end,
    },
    episode: episode ? toEpisodeDto(episode) : null,
    earlierEpisodes: episodes
      .filter((one) => one.id !== episode?.id)
      .map(toEpisodeDto)
      .reverse(),
    tidalVolumePerKg: toTidalVolumePerKg(latest.settings, patient, head.isAdult),
    ...readDay(ctx, found, episode, today),
    latest,
    days: episode ? toPatientDays(recorded, episode, unit.timeZone) : [],
    trends: toTrends(recorded, head.isAdult),
    may: listMay(ctx, found),
  }
}

function auditOpening(ctx: Ctx, { unit, patient }: PatientInUnit): void {
  ctx.db.transaction(
    (tx) =>
      writeAudit(tx, ctx, { action: 'patient.read_by_opening', unitId: unit.id, subject: { kind: 'patient', id: patient.id } }),
    { behavior: 'immediate' },
  )
}

function openUntil(ctx: Ctx, { isOpening, patient }: PatientInUnit): number | null {
  if (!isOpening || ctx.actor.kind !== 'person') return null
  return findValidOpening(ctx.db, ctx.actor.personId, patient.id, ctx.now)?.expiresAt ?? null
}

/** The episode's present day: number, next move and day track. */
function readDay(ctx: Ctx, found: PatientInUnit, episode: EpisodeRow | undefined, today: string) {
  const { unit } = found
  const { inForce, find } = findUnitProtocol(ctx.db, unit.id, ctx.now)
  const axis = {
    today,
    trackFromMs: wallClockMs(today, unit.dayTrackFromHour * 60, unit.timeZone),
    trackToMs: wallClockMs(today, unit.dayTrackToHour * 60, unit.timeZone),
  }
  if (!episode) {
    return {
      ...axis,
      ventilatorDayNumber: null,
      move: null,
      moveHref: null,
      track: { screens: [], holds: [], pairingWindow: null, trials: [], decisions: [] },
    }
  }
  const record = readDayRecord(ctx.db, { ...found, episode }, ctx.now, find)
  const clock = makeDayClock(ctx.now, unit.timeZone, inForce.content.screeningWindow)
  const move = nextMove({ protocol: inForce.content, record, clock })
  const lastDay = episode.endedAt === null ? today : localDay(episode.endedAt, unit.timeZone)
  return {
    ...axis,
    ventilatorDayNumber: ventilatorDayNumber(localDay(episode.startedAt, unit.timeZone), lastDay),
    move,
    moveHref: moveHref(episode.id, move),
    track: toDayTrack(record, today, inForce.content.pairingWindowMin),
  }
}

function latestSettings(recorded: RecordedDto[]): SettingsDto | null {
  const current = recorded.flatMap((one) => (one.kind === 'settings' && !one.isWithdrawn ? [one.entry] : []))
  return current.sort((a, b) => a.observedAt - b.observedAt || a.recordedAt - b.recordedAt).at(-1) ?? null
}

function latestGas(recorded: RecordedDto[]): GasDto | null {
  const current = recorded.flatMap((one) => (one.kind === 'gas' && !one.isWithdrawn ? [one.entry] : []))
  return current.sort((a, b) => a.observedAt - b.observedAt || a.recordedAt - b.recordedAt).at(-1) ?? null
}

function listMay(ctx: Ctx, { isOpening, unit }: PatientInUnit): PatientActions {
  const { actor } = ctx
  const may = (action: (typeof PATIENT_ACTIONS)[number]) =>
    actor.kind === 'person' && !isOpening && mayInUnit(actor.memberships, action, unit.id)
  return Object.fromEntries(PATIENT_ACTIONS.map((action) => [action, may(action)])) as PatientActions
}
