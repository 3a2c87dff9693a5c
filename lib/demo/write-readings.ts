import type { SeedRows } from '@/db/seed'
import type { VentilatorMode } from '@/lib/weaning/vocabulary'
import type { Vitals } from './physiology'
import { entry, type Course, type World } from './world'

type SettingsRow = SeedRows['settings'][number]

/** Adds the ventilator settings of a moment, in keeping with how the patient is. */
export function writeSettings(world: World, course: Course, atMs: number, vitals: Vitals, lateMin?: number): SettingsRow {
  const { random, rows } = world
  const { severity } = vitals
  const isControlled = severity > 0.55
  const mode: VentilatorMode = isControlled ? (random.chance(0.6) ? 'VC-CMV' : 'PC-CMV') : severity > 0.4 ? 'PC-IMV' : 'PC-CSV'
  const isSpontaneous = mode === 'PC-CSV'
  const drivingPressure = Math.round(9 + 7 * severity + random.between(-1, 1))
  const row: SettingsRow = {
    ...entry(world, course, atMs, 'rt', lateMin),
    mode,
    fio2Fraction: vitals.fio2Fraction,
    peepCmH2O: vitals.peepCmH2O,
    setRatePerMin: isSpontaneous ? null : Math.round(14 + 8 * severity),
    setTidalVolumeMl: mode === 'VC-CMV' ? vitals.tidalVolumeMl : null,
    inspiratoryPressureCmH2O: mode === 'PC-CMV' || mode === 'PC-IMV' ? drivingPressure : null,
    pressureSupportCmH2O: isSpontaneous || mode === 'PC-IMV' ? Math.round(6 + 10 * severity) : null,
    measuredRatePerMin: vitals.breathsPerMin,
    measuredTidalVolumeMl: vitals.tidalVolumeMl,
    peakPressureCmH2O: vitals.peepCmH2O + drivingPressure + random.whole(1, 4),
    plateauPressureCmH2O: isControlled ? vitals.peepCmH2O + drivingPressure : null,
    spo2Percent: vitals.spo2Percent,
  }
  rows.settings.push(row)
  return row
}

/** Adds a blood gas in keeping with how the patient is. */
export function writeGas(world: World, course: Course, atMs: number, vitals: Vitals): void {
  const { random } = world
  world.rows.gases.push({
    ...entry(world, course, atMs, 'rt'),
    ph: vitals.ph,
    paCO2MmHg: vitals.paCO2MmHg,
    paO2MmHg: vitals.paO2MmHg,
    fio2Fraction: vitals.fio2Fraction,
    // Henderson and Hasselbalch, so that the three values of a gas agree.
    bicarbonateMmolPerL: Math.round(0.0307 * vitals.paCO2MmHg * 10 ** (vitals.ph - 6.1)),
    lactateMmolPerL: Number(Math.max(0.5, random.normal(1 + 1.6 * vitals.severity, 0.4)).toFixed(1)),
    haemoglobinGPerDl: vitals.haemoglobinGPerDl,
  })
}
