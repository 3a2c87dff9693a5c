import 'server-only'
import { listDayEntries } from '@/db/queries/day-entries'
import { listFreeBeds, listLatestSettings, listVentilatedOfUnit } from '@/db/queries/today'
import { authorize, type UnitRow } from '@/lib/access/door'
import type { TodayDto, TodayRowDto } from '@/lib/schemas/today'
import type { Ctx } from '@/lib/server/ctx'
import { ageYears, HOUR_MS } from '@/lib/shared/time'
import type { DayRecord } from '@/lib/weaning/day-record'
import { isAdult } from '@/lib/weaning/indices/is-adult'
import { nextMove } from '@/lib/weaning/next-move'
import { makeDayClock } from './day-clock'
import { findUnitProtocol } from './find-unit-protocol'
import { keepToday } from './kept-today'
import { rememberedMoment } from './remembered-time'
import { LONGEST_DAY_MS, sinceDay } from './since-day'
import { groupDayEntries, toDayRecord } from './to-day-record'
import { latestScreenOf, toTodayRow, type Ventilated } from './to-today-row'

/** How long a patient stays on the list after ventilation ended. */
export const WATCH_HOURS = 72

/** The unit's day: every ventilated patient, and those in the watch after it, each with exactly one next move or the reason for none. */
export function listToday(ctx: Ctx, input: { unitId: string }): TodayDto {
  const { unit } = authorize(ctx, 'today.read', { unitId: input.unitId })
  return keepToday(ctx, unit.id, () => workOutToday(ctx, unit))
}

function workOutToday(ctx: Ctx, unit: UnitRow): TodayDto {
  const { inForce, find } = findUnitProtocol(ctx.db, unit.id, ctx.now)
  const clock = makeDayClock(ctx.now, unit.timeZone, inForce.content.screeningWindow)
  const found = latestOfEachPatient(listVentilatedOfUnit(ctx.db, unit.id, ctx.now - WATCH_HOURS * HOUR_MS))
  const episodeIds = found.map((row) => row.episode.id)
  const grouped = groupDayEntries(listDayEntries(ctx.db, episodeIds, sinceDay(clock), ctx.now - LONGEST_DAY_MS))
  const settingsOf = new Map(listLatestSettings(ctx.db, episodeIds).map((row) => [row.episodeId, row]))
  const listed = found.map((row) => {
    const record = toDayRecord(row.episode, isAdult(ageYears(row.birthDate, clock.day)), grouped, find, ctx.now)
    const move = nextMove({ protocol: inForce.content, record, clock })
    const settings = settingsOf.get(row.episode.id)
    const parts = {
      row,
      record,
      move,
      settings,
      day: clock.day,
      timeZone: unit.timeZone,
      pairingWindowMin: inForce.content.pairingWindowMin,
    }
    return { row: toTodayRow(parts), record }
  })
  return {
    unit: {
      id: unit.id,
      name: unit.name,
      timeZone: unit.timeZone,
      dayTrackFromHour: unit.dayTrackFromHour,
      dayTrackToHour: unit.dayTrackToHour,
    },
    day: clock.day,
    trackFromMs: rememberedMoment(clock.day, unit.dayTrackFromHour * 60, unit.timeZone),
    trackToMs: rememberedMoment(clock.day, unit.dayTrackToHour * 60, unit.timeZone),
    nowMs: ctx.now,
    counts: countRows(
      listed.filter(({ row }) => row.endedAtMs === null),
      clock.day,
    ),
    rows: listed.map(({ row }) => row),
    emptyBeds: listFreeBeds(ctx.db, unit.id).map((bed) => bed.label),
  }
}

/** A patient who is ventilated again is listed once, with the later episode. Rows come in bed order, earlier episodes first. */
function latestOfEachPatient(rows: Ventilated[]): Ventilated[] {
  return [...new Map(rows.map((row) => [row.patientId, row])).values()]
}

function countRows(listed: { row: TodayRowDto; record: DayRecord }[], day: string): TodayDto['counts'] {
  const count = (matches: (one: { row: TodayRowDto; record: DayRecord }) => boolean) => listed.filter(matches).length
  return {
    ventilated: listed.length,
    screened: count(({ record }) => (latestScreenOf(record, day)?.result ?? 'incomplete') !== 'incomplete'),
    ready: count(({ record }) => latestScreenOf(record, day)?.result === 'ready'),
    onHold: count(({ record }) => record.holds.some((hold) => hold.start === 'started' && hold.endedMs === null)),
    onTrial: count(({ record }) => record.trials.some((trial) => trial.endedMs === null)),
    decisionsOwed: count(
      ({ row }) => row.move.kind === 'move' && (row.move.step === 'decide' || row.move.step === 'decide_again'),
    ),
    overdue: count(({ row }) => row.move.kind === 'move' && row.move.isOverdue),
  }
}
