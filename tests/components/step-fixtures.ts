import type { EntryDto } from '@/lib/schemas/observed'
import type { StepFormDto } from '@/lib/schemas/step-form'
import { defaultProtocol } from '@/lib/weaning/published/default-protocol'
import type { ObservedReadings, ScreenReadings } from '@/lib/weaning/readings'

/** 1 December 2026, 07:36 in UTC, which is the unit's zone here. */
export const NOW_MS = Date.UTC(2026, 11, 1, 7, 36)
export const MIN = 60_000

/** What every step's page gets, for an invented patient in an invented unit. */
export function stepForm(): StepFormDto {
  return {
    patient: {
      patientId: 'p1',
      episodeId: 'e1',
      unitId: 'u1',
      unitName: 'Medical ICU',
      timeZone: 'UTC',
      bedLabel: 'M11',
      familyName: 'Invented',
      givenName: 'Ada',
      sex: 'female',
      ageYears: 61,
      isAdult: true,
      heightCm: 165,
      weightKg: 70,
      predictedBodyWeightKg: 56.966,
      ventilatorDayNumber: 2,
      airway: 'endotracheal_tube',
      episodeStartedAt: NOW_MS - 30 * 60 * MIN,
      episodeEndedAt: null,
    },
    protocol: { id: 'v1', number: 1, isDefault: true, startsAt: null, content: defaultProtocol },
    prefill: {
      settings: {
        observedAt: NOW_MS - 86 * MIN,
        mode: 'PC-CSV',
        fio2Fraction: 0.4,
        peepCmH2O: 5,
        pressureSupportCmH2O: 8,
        measuredRatePerMin: 20,
        measuredTidalVolumeMl: 420,
        spo2Percent: 96,
      },
      gas: null,
    },
    move: {
      kind: 'move',
      step: 'screen',
      role: 'rt',
      sinceMs: NOW_MS - 60 * MIN,
      dueMs: NOW_MS + 84 * MIN,
      isOverdue: false,
      why: { code: 'window_open', closesMs: NOW_MS + 84 * MIN },
    },
    nowMs: NOW_MS,
    wallClock: { day: '2026-12-01', time: '07:36' },
    ventilatorDay: '2026-12-01',
    seenLatestId: null,
  }
}

/** The part of an entry that all kinds share, observed so many minutes ago. */
export function entry(id: string, minutesAgo: number): EntryDto {
  return {
    id,
    entryId: id,
    entryVersion: 1,
    isAmended: false,
    amendReason: null,
    isLate: false,
    observedAt: NOW_MS - minutesAgo * MIN,
    recordedAt: NOW_MS - minutesAgo * MIN,
    recordedByName: 'Invented Colleague',
    ventilatorDay: '2026-12-01',
    protocolNumber: 1,
    unlikely: [],
  }
}

export const NO_SCREEN_READINGS: ScreenReadings = {
  fio2Fraction: null,
  peepCmH2O: null,
  norepinephrineMcgPerKgMin: null,
  otherVasopressor: null,
  ischaemia: null,
  spo2Percent: null,
  paO2MmHg: null,
  paO2FiO2Fraction: null,
  ph: null,
  spontaneousEffort: null,
  cough: null,
  secretions: null,
  rass: null,
  raisedIcp: null,
  neuromuscularBlockade: null,
  temperatureC: null,
  haemoglobinGPerDl: null,
  causeImproving: null,
  breathsPerMin: null,
  tidalVolumeMl: null,
  rsbiCondition: null,
}

export function look(values: Partial<ObservedReadings> = {}): ObservedReadings {
  return {
    breathsPerMin: null,
    tidalVolumeMl: null,
    spo2Percent: null,
    heartRatePerMin: null,
    systolicMmHg: null,
    diastolicMmHg: null,
    rass: null,
    paCO2MmHg: null,
    paO2MmHg: null,
    ph: null,
    signs: [],
    ...values,
  }
}
