import { sql } from 'drizzle-orm'
import { integer, text, type AnySQLiteColumn } from 'drizzle-orm/sqlite-core'
import { episodes } from './episodes'
import { people } from './people'
import { protocolVersions } from './protocols'
import { units } from './units'

/**
 * What every clinical entry carries. Rows are only ever added: an amendment is a new row that names the one it supersedes,
 * and triggers in the migrations refuse UPDATE and DELETE. The current version is the one nobody supersedes; the unique
 * index on supersedesId lets only one amendment of a version in.
 */
export const entryColumns = (self: () => AnySQLiteColumn) => ({
  id: text('id').primaryKey(),
  /** The id of the first version, shared by all versions of the entry. */
  entryId: text('entry_id').notNull(),
  entryVersion: integer('entry_version').notNull().default(1),
  supersedesId: text('supersedes_id').unique().references(self),
  amendReason: text('amend_reason'),
  isWithdrawn: integer('is_withdrawn', { mode: 'boolean' })
    .notNull()
    .default(sql`0`),
  episodeId: text('episode_id')
    .notNull()
    .references(() => episodes.id, { onDelete: 'restrict' }),
  /** The unit that the patient was in when it was observed. */
  unitId: text('unit_id')
    .notNull()
    .references(() => units.id, { onDelete: 'restrict' }),
  /** Calendar day in the unit's time zone, yyyy-mm-dd. */
  ventilatorDay: text('ventilator_day').notNull(),
  observedAt: integer('observed_at').notNull(),
  recordedAt: integer('recorded_at').notNull(),
  recordedBy: text('recorded_by')
    .notNull()
    .references(() => people.id, { onDelete: 'restrict' }),
  protocolVersionId: text('protocol_version_id')
    .notNull()
    .references(() => protocolVersions.id, { onDelete: 'restrict' }),
})
