import { sql } from 'drizzle-orm'
import { index, integer, real, sqliteTable, text, uniqueIndex, type AnySQLiteColumn } from 'drizzle-orm/sqlite-core'
import type { ObservedReadings } from '@/lib/weaning/readings'
import { TRIAL_OUTCOMES, TRIAL_TECHNIQUES } from '@/lib/weaning/vocabulary'
import { entryColumns } from './columns'

export const trials = sqliteTable(
  'trials',
  {
    ...entryColumns((): AnySQLiteColumn => trials.id),
    technique: text('technique', { enum: TRIAL_TECHNIQUES }).notNull(),
    pressureSupportCmH2O: real('pressure_support_cmh2o'),
    peepCmH2O: real('peep_cmh2o'),
    fio2Fraction: real('fio2_fraction').notNull(),
    plannedDurationMin: integer('planned_duration_min').notNull(),
    baseline: text('baseline', { mode: 'json' }).$type<ObservedReadings>().notNull(),
    /** Given when the day's record did not lead to a trial (no ready screen, hold not resolved). */
    startedAnywayBecause: text('started_anyway_because'),
  },
  (table) => [
    index('trials_episode').on(table.episodeId, table.ventilatorDay),
    index('trials_unit_day').on(table.unitId, table.ventilatorDay),
  ],
)

export const trialObservations = sqliteTable(
  'trial_observations',
  {
    ...entryColumns((): AnySQLiteColumn => trialObservations.id),
    trialId: text('trial_id')
      .notNull()
      .references(() => trials.id, { onDelete: 'restrict' }),
    readings: text('readings', { mode: 'json' }).$type<ObservedReadings>().notNull(),
  },
  (table) => [index('trial_observations_trial').on(table.trialId, table.observedAt)],
)

export const trialEnds = sqliteTable(
  'trial_ends',
  {
    ...entryColumns((): AnySQLiteColumn => trialEnds.id),
    trialId: text('trial_id')
      .notNull()
      .references(() => trials.id, { onDelete: 'restrict' }),
    outcome: text('outcome', { enum: TRIAL_OUTCOMES }).notNull(),
    rulesMet: text('rules_met', { mode: 'json' }).$type<string[]>().notNull(),
    /** What the patient went back to, in words. */
    returnedTo: text('returned_to').notNull(),
    reason: text('reason'),
  },
  (table) => [
    uniqueIndex('trial_ends_first')
      .on(table.trialId)
      .where(sql`entry_version = 1`),
    index('trial_ends_trial').on(table.trialId),
  ],
)
