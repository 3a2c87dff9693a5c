import { sql } from 'drizzle-orm'
import { check, index, integer, real, sqliteTable, text, uniqueIndex } from 'drizzle-orm/sqlite-core'
import { SEXES, STAY_ENDS } from '@/lib/weaning/vocabulary'
import { people } from './people'
import { beds, hospitals, units } from './units'

export const patients = sqliteTable(
  'patients',
  {
    id: text('id').primaryKey(),
    hospitalId: text('hospital_id')
      .notNull()
      .references(() => hospitals.id, { onDelete: 'restrict' }),
    recordNumber: text('record_number').notNull(),
    familyName: text('family_name').notNull(),
    givenName: text('given_name').notNull(),
    /** yyyy-mm-dd; null when not known, and then no index is computed. */
    birthDate: text('birth_date'),
    sex: text('sex', { enum: SEXES }),
    heightCm: real('height_cm'),
    /** Measured or estimated body weight, for doses; tidal volume goes by predicted body weight. */
    weightKg: real('weight_kg'),
    createdAt: integer('created_at').notNull(),
    createdBy: text('created_by')
      .notNull()
      .references(() => people.id, { onDelete: 'restrict' }),
    version: integer('version').notNull().default(1),
  },
  (table) => [uniqueIndex('patients_record_number').on(table.hospitalId, table.recordNumber)],
)

/** A patient in a bed of a unit, ventilated or not. A move ends one stay and begins the next. */
export const stays = sqliteTable(
  'stays',
  {
    id: text('id').primaryKey(),
    patientId: text('patient_id')
      .notNull()
      .references(() => patients.id, { onDelete: 'restrict' }),
    unitId: text('unit_id')
      .notNull()
      .references(() => units.id, { onDelete: 'restrict' }),
    bedId: text('bed_id')
      .notNull()
      .references(() => beds.id, { onDelete: 'restrict' }),
    startedAt: integer('started_at').notNull(),
    endedAt: integer('ended_at'),
    end: text('end', { enum: STAY_ENDS }),
    version: integer('version').notNull().default(1),
  },
  (table) => [
    index('stays_unit_time').on(table.unitId, table.startedAt),
    index('stays_patient').on(table.patientId, table.startedAt),
    uniqueIndex('stays_open_patient')
      .on(table.patientId)
      .where(sql`ended_at is null`),
    uniqueIndex('stays_open_bed')
      .on(table.bedId)
      .where(sql`ended_at is null`),
    index('stays_open_unit')
      .on(table.unitId)
      .where(sql`ended_at is null`),
    check('stays_order', sql`${table.endedAt} is null or ${table.endedAt} >= ${table.startedAt}`),
  ],
)

/** Someone outside the unit opened one patient's record for a stated reason, for a limited time. */
export const recordOpenings = sqliteTable(
  'record_openings',
  {
    id: text('id').primaryKey(),
    patientId: text('patient_id')
      .notNull()
      .references(() => patients.id, { onDelete: 'restrict' }),
    unitId: text('unit_id')
      .notNull()
      .references(() => units.id, { onDelete: 'restrict' }),
    personId: text('person_id')
      .notNull()
      .references(() => people.id, { onDelete: 'restrict' }),
    reason: text('reason').notNull(),
    openedAt: integer('opened_at').notNull(),
    expiresAt: integer('expires_at').notNull(),
  },
  (table) => [
    index('record_openings_person').on(table.personId, table.patientId),
    index('record_openings_unit').on(table.unitId, table.openedAt),
  ],
)
