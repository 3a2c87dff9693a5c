import type { settings } from '@/db/schema'
import type { EntryDto } from '@/lib/schemas/observed'
import type { SettingsDto } from '@/lib/schemas/settings'

/** What a settings entry adds to what every entry carries. */
export function toSettingsValues(row: typeof settings.$inferSelect): Omit<SettingsDto, keyof EntryDto> {
  return {
    mode: row.mode,
    fio2Fraction: row.fio2Fraction,
    peepCmH2O: row.peepCmH2O,
    setRatePerMin: row.setRatePerMin,
    setTidalVolumeMl: row.setTidalVolumeMl,
    inspiratoryPressureCmH2O: row.inspiratoryPressureCmH2O,
    pressureSupportCmH2O: row.pressureSupportCmH2O,
    measuredRatePerMin: row.measuredRatePerMin,
    measuredTidalVolumeMl: row.measuredTidalVolumeMl,
    peakPressureCmH2O: row.peakPressureCmH2O,
    plateauPressureCmH2O: row.plateauPressureCmH2O,
    spo2Percent: row.spo2Percent,
  }
}
