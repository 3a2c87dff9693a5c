import { z } from 'zod'
import type { NextMove } from '@/lib/weaning/day-record'
import type {
  Airway,
  DecisionChoice,
  ExcuseReason,
  HoldOutcome,
  HoldStart,
  ScreenResult,
  TrialOutcome,
  VentilatorMode,
} from '@/lib/weaning/vocabulary'

export const todayQuerySchema = z.object({ unitId: z.string().min(1) })

/** One patient's ventilator day as the day track draws it. Times in UTC milliseconds; an open end is null. */
export type DayTrackDto = {
  screens: { atMs: number; result: ScreenResult }[]
  holds: { startMs: number; endMs: number | null; start: HoldStart; outcome: HoldOutcome | null }[]
  pairingWindow: { startMs: number; endMs: number } | null
  trials: { startMs: number; endMs: number | null; outcome: TrialOutcome | null; observationsMs: number[] }[]
  decisions: { atMs: number; choice: DecisionChoice }[]
}

export type TodayRowDto = {
  patientId: string
  episodeId: string
  bedLabel: string
  bedOrder: number
  familyName: string
  givenName: string
  /** Day 1 is the calendar day on which ventilation began. */
  ventilatorDayNumber: number
  airway: Airway
  settings: { mode: VentilatorMode; fio2Fraction: number; peepCmH2O: number; observedAtMs: number } | null
  track: DayTrackDto
  move: NextMove
  /** Where the step that is owed is done; null when nothing is owed. Shown as a link only to those whose role may. */
  moveHref: string | null
  excuse: ExcuseReason | null
  /** Set for the watch after ventilation ended. */
  endedAtMs: number | null
}

export type TodayDto = {
  unit: { id: string; name: string; timeZone: string; dayTrackFromHour: number; dayTrackToHour: number }
  /** The unit's calendar day, and its first and last shown moment. */
  day: string
  trackFromMs: number
  trackToMs: number
  nowMs: number
  counts: {
    ventilated: number
    screened: number
    ready: number
    onHold: number
    onTrial: number
    decisionsOwed: number
    overdue: number
  }
  /** In bed order. */
  rows: TodayRowDto[]
  emptyBeds: string[]
}
