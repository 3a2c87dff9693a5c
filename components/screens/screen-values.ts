import { HOUR_MS } from '@/lib/shared/time'
import type { PrefillDto } from '@/lib/schemas/step-form'
import type { ScreenReadings } from '@/lib/weaning/readings'

export const NO_READINGS: ScreenReadings = {
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

/** Which readings are carried over and not yet confirmed, with the time they were observed (UTC ms). */
export type Carried = Partial<Record<keyof ScreenReadings, number>>

/** Older values are not offered: they are looked at again rather than tapped through. Common practice, no source. */
export const CARRIED_FOR_MS = 12 * HOUR_MS

/** A screen of today that was left incomplete: completing it takes its readings over, so that nothing is typed twice. */
export type LeftIncomplete = { observedAt: number; readings: ScreenReadings }

/**
 * Values that a screen can start from, each with its age: of the last settings and gas, and of today's screen if it was left incomplete; the
 * later one wins. Rate and volume come from an earlier screen only: measured on full support they say nothing about the RSBI. Nothing carried
 * over counts until it is confirmed.
 */
export function carryOver(
  prefill: PrefillDto,
  left: LeftIncomplete | null,
  nowMs: number,
): { readings: ScreenReadings; carried: Carried } {
  const readings = { ...NO_READINGS }
  const carried: Carried = {}
  const offer = (values: Partial<ScreenReadings>, observedAt: number) => {
    if (nowMs - observedAt > CARRIED_FOR_MS) return
    for (const [name, value] of Object.entries(values) as [keyof ScreenReadings, unknown][]) {
      if (value === null || (carried[name] ?? 0) > observedAt) continue
      Object.assign(readings, { [name]: value })
      carried[name] = observedAt
    }
  }
  const { settings, gas } = prefill
  if (settings)
    offer(
      { fio2Fraction: settings.fio2Fraction, peepCmH2O: settings.peepCmH2O, spo2Percent: settings.spo2Percent },
      settings.observedAt,
    )
  if (gas)
    offer(
      { paO2MmHg: gas.paO2MmHg, paO2FiO2Fraction: gas.fio2Fraction, ph: gas.ph, haemoglobinGPerDl: gas.haemoglobinGPerDl },
      gas.observedAt,
    )
  if (left) offer(left.readings, left.observedAt)
  return { readings, carried }
}

/**
 * The readings that count: what is carried over and not confirmed is not assessed. A number that cannot be read is not assessed either when
 * judging; when the form is checked it is kept, so that the refusal stands at its field.
 */
export function confirmedReadings(
  readings: ScreenReadings,
  carried: Carried,
  unreadable: 'not assessed' | 'keep unreadable' = 'not assessed',
): ScreenReadings {
  const entries = Object.entries(readings).map(([name, value]: [string, unknown]) => {
    const isUnread = unreadable === 'not assessed' && typeof value === 'number' && Number.isNaN(value)
    return [name, name in carried || value === undefined || isUnread ? null : value]
  })
  return Object.fromEntries(entries) as ScreenReadings
}
