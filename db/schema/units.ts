import { sql } from 'drizzle-orm'
import { check, index, integer, real, sqliteTable, text, uniqueIndex } from 'drizzle-orm/sqlite-core'

export const hospitals = sqliteTable(
  'hospitals',
  {
    id: text('id').primaryKey(),
    name: text('name').notNull(),
    /** True for invented data only; real use refuses to start on such a database. */
    isDemo: integer('is_demo', { mode: 'boolean' })
      .notNull()
      .default(sql`0`),
    idleLockMin: integer('idle_lock_min').notNull().default(15),
    createdAt: integer('created_at').notNull(),
    version: integer('version').notNull().default(1),
  },
  (table) => [check('hospitals_idle_lock', sql`${table.idleLockMin} between 1 and 240`)],
)

export const units = sqliteTable(
  'units',
  {
    id: text('id').primaryKey(),
    hospitalId: text('hospital_id')
      .notNull()
      .references(() => hospitals.id, { onDelete: 'restrict' }),
    name: text('name').notNull(),
    timeZone: text('time_zone').notNull(),
    altitudeM: real('altitude_m').notNull().default(0),
    /** A barometer reading wins over the altitude. */
    barometricPressureMmHg: real('barometric_pressure_mmhg'),
    dayTrackFromHour: integer('day_track_from_hour').notNull().default(4),
    dayTrackToHour: integer('day_track_to_hour').notNull().default(20),
    createdAt: integer('created_at').notNull(),
    retiredAt: integer('retired_at'),
    version: integer('version').notNull().default(1),
  },
  (table) => [index('units_hospital').on(table.hospitalId)],
)

export const beds = sqliteTable(
  'beds',
  {
    id: text('id').primaryKey(),
    unitId: text('unit_id')
      .notNull()
      .references(() => units.id, { onDelete: 'restrict' }),
    label: text('label').notNull(),
    sortOrder: integer('sort_order').notNull(),
    createdAt: integer('created_at').notNull(),
    retiredAt: integer('retired_at'),
  },
  (table) => [uniqueIndex('beds_label').on(table.unitId, table.label)],
)
