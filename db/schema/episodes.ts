import { sql } from 'drizzle-orm'
import { check, index, integer, sqliteTable, text, uniqueIndex } from 'drizzle-orm/sqlite-core'
import { AIRWAYS, EPISODE_ENDS, EPISODE_STARTS } from '@/lib/weaning/vocabulary'
import { patients } from './patients'
import { people } from './people'

/** One run of invasive ventilation. Ends when the tube or the ventilator goes; a reintubation begins the next one. */
export const episodes = sqliteTable(
  'episodes',
  {
    id: text('id').primaryKey(),
    patientId: text('patient_id')
      .notNull()
      .references(() => patients.id, { onDelete: 'restrict' }),
    startedAt: integer('started_at').notNull(),
    start: text('start', { enum: EPISODE_STARTS }).notNull(),
    airway: text('airway', { enum: AIRWAYS }).notNull(),
    endedAt: integer('ended_at'),
    end: text('end', { enum: EPISODE_ENDS }),
    recordedAt: integer('recorded_at').notNull(),
    recordedBy: text('recorded_by')
      .notNull()
      .references(() => people.id, { onDelete: 'restrict' }),
    endRecordedAt: integer('end_recorded_at'),
    endRecordedBy: text('end_recorded_by').references(() => people.id, { onDelete: 'restrict' }),
    version: integer('version').notNull().default(1),
  },
  (table) => [
    index('episodes_patient').on(table.patientId, table.startedAt),
    index('episodes_time').on(table.startedAt),
    uniqueIndex('episodes_open')
      .on(table.patientId)
      .where(sql`ended_at is null`),
    check('episodes_order', sql`${table.endedAt} is null or ${table.endedAt} >= ${table.startedAt}`),
  ],
)
