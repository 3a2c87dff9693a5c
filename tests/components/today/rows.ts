import type { TodayDto, TodayRowDto } from '@/lib/schemas/today'
import type { MoveStep, NextMove } from '@/lib/weaning/day-record'
import type { ClinicalRole } from '@/lib/weaning/vocabulary'

export const NOW = Date.parse('2026-12-01T08:52:00Z')

/** A move that somebody owes, for what the page draws; why it is owed does not matter here. */
export function owed(step: MoveStep, role: ClinicalRole, dueMs: number, isOverdue = false): NextMove {
  return { kind: 'move', step, role, sinceMs: 0, dueMs, isOverdue, why: { code: 'window_open', closesMs: dueMs } }
}

/** An invented patient in bed M01, M02 … */
export function makeRow(bed: number, change: Partial<TodayRowDto> = {}): TodayRowDto {
  return {
    patientId: `p${bed}`,
    episodeId: `e${bed}`,
    bedLabel: `M${String(bed).padStart(2, '0')}`,
    bedOrder: bed,
    familyName: `Family${bed}`,
    givenName: 'Given',
    ventilatorDayNumber: 3,
    airway: 'endotracheal_tube',
    settings: { mode: 'PC-CSV', fio2Fraction: 0.4, peepCmH2O: 5, observedAtMs: NOW },
    track: { screens: [], holds: [], pairingWindow: null, trials: [], decisions: [] },
    move: owed('screen', 'rt', NOW + 480_000),
    moveHref: `/episodes/e${bed}/screen`,
    excuse: null,
    endedAtMs: null,
    ...change,
  }
}

export function makeToday(rows: TodayRowDto[], change: Partial<TodayDto> = {}): TodayDto {
  return {
    unit: { id: 'micu', name: 'Medical ICU', timeZone: 'UTC', dayTrackFromHour: 4, dayTrackToHour: 20 },
    day: '2026-12-01',
    trackFromMs: Date.parse('2026-12-01T04:00:00Z'),
    trackToMs: Date.parse('2026-12-01T20:00:00Z'),
    nowMs: NOW,
    counts: { ventilated: rows.length, screened: 0, ready: 0, onHold: 0, onTrial: 0, decisionsOwed: 0, overdue: 0 },
    rows,
    emptyBeds: ['M15', 'M16'],
    ...change,
  }
}
