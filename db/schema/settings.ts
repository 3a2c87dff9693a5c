import { index, real, sqliteTable, text, type AnySQLiteColumn } from 'drizzle-orm/sqlite-core'
import { VENTILATOR_MODES } from '@/lib/weaning/vocabulary'
import { entryColumns } from './columns'

export const settings = sqliteTable(
  'settings',
  {
    ...entryColumns((): AnySQLiteColumn => settings.id),
    mode: text('mode', { enum: VENTILATOR_MODES }).notNull(),
    fio2Fraction: real('fio2_fraction').notNull(),
    peepCmH2O: real('peep_cmh2o').notNull(),
    setRatePerMin: real('set_rate_per_min'),
    setTidalVolumeMl: real('set_tidal_volume_ml'),
    inspiratoryPressureCmH2O: real('inspiratory_pressure_cmh2o'),
    pressureSupportCmH2O: real('pressure_support_cmh2o'),
    measuredRatePerMin: real('measured_rate_per_min'),
    measuredTidalVolumeMl: real('measured_tidal_volume_ml'),
    peakPressureCmH2O: real('peak_pressure_cmh2o'),
    plateauPressureCmH2O: real('plateau_pressure_cmh2o'),
    spo2Percent: real('spo2_percent'),
  },
  (table) => [index('settings_episode').on(table.episodeId, table.observedAt)],
)

export const gases = sqliteTable(
  'gases',
  {
    ...entryColumns((): AnySQLiteColumn => gases.id),
    ph: real('ph').notNull(),
    paCO2MmHg: real('paco2_mmhg').notNull(),
    paO2MmHg: real('pao2_mmhg').notNull(),
    fio2Fraction: real('fio2_fraction').notNull(),
    bicarbonateMmolPerL: real('bicarbonate_mmol_per_l'),
    lactateMmolPerL: real('lactate_mmol_per_l'),
    haemoglobinGPerDl: real('haemoglobin_g_per_dl'),
  },
  (table) => [index('gases_episode').on(table.episodeId, table.observedAt)],
)
