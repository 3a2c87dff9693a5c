import type { listLatestSettings, listVentilatedOfUnit } from '@/db/queries/today'
import type { TodayRowDto } from '@/lib/schemas/today'
import { ventilatorDayNumber } from '@/lib/weaning/course/ventilator-day-number'
import type { DayRecord, DayScreen, NextMove } from '@/lib/weaning/day-record'
import { moveHref } from './move-href'
import { rememberedDay } from './remembered-time'
import { toDayTrack } from './to-day-track'

export type Ventilated = ReturnType<typeof listVentilatedOfUnit>[number]
type Settings = ReturnType<typeof listLatestSettings>[number]
type Parts = {
  row: Ventilated
  record: DayRecord
  move: NextMove
  settings: Settings | undefined
  day: string
  timeZone: string
  pairingWindowMin: number
}

/** One patient's row on Today. `day` is the unit's calendar day now. */
export function toTodayRow({ row, record, move, settings, day, timeZone, pairingWindowMin }: Parts): TodayRowDto {
  const { episode } = row
  const lastDay = episode.endedAt === null ? day : rememberedDay(episode.endedAt, timeZone)
  return {
    patientId: row.patientId,
    episodeId: episode.id,
    bedLabel: row.bedLabel,
    bedOrder: row.bedOrder,
    familyName: row.familyName,
    givenName: row.givenName,
    ventilatorDayNumber: ventilatorDayNumber(rememberedDay(episode.startedAt, timeZone), lastDay),
    airway: episode.airway,
    settings: settings
      ? {
          mode: settings.mode,
          fio2Fraction: settings.fio2Fraction,
          peepCmH2O: settings.peepCmH2O,
          observedAtMs: settings.observedAt,
        }
      : null,
    track: toDayTrack(record, day, pairingWindowMin),
    move,
    moveHref: moveHref(episode.id, move),
    excuse: latestScreenOf(record, day)?.excuse ?? null,
    endedAtMs: episode.endedAt,
  }
}

/** The screen that counts for a calendar day: the one last observed. */
export function latestScreenOf(record: DayRecord, day: string): DayScreen | undefined {
  return record.screens.filter((screen) => screen.ventilatorDay === day).at(-1)
}
