import { integer, sqliteTable, text, uniqueIndex, index } from 'drizzle-orm/sqlite-core'
import type { ProtocolContent } from '@/lib/weaning/protocol'
import { people } from './people'
import { units } from './units'

/**
 * A unit's protocol. A draft (approvedAt null, isDefault false) may change; an approved version never does, and triggers refuse it.
 * In force at a moment: the approved or default version with the latest startsAt not after it, the higher number on a tie.
 */
export const protocolVersions = sqliteTable(
  'protocol_versions',
  {
    id: text('id').primaryKey(),
    unitId: text('unit_id')
      .notNull()
      .references(() => units.id, { onDelete: 'restrict' }),
    number: integer('number').notNull(),
    content: text('content', { mode: 'json' }).$type<ProtocolContent>().notNull(),
    note: text('note').notNull(),
    /** The product's default values, in force until a physician of the unit approves a version. */
    isDefault: integer('is_default', { mode: 'boolean' }).notNull().default(false),
    draftedAt: integer('drafted_at').notNull(),
    draftedBy: text('drafted_by').references(() => people.id, { onDelete: 'restrict' }),
    approvedAt: integer('approved_at'),
    approvedBy: text('approved_by').references(() => people.id, { onDelete: 'restrict' }),
    startsAt: integer('starts_at'),
    version: integer('version').notNull().default(1),
  },
  (table) => [
    uniqueIndex('protocol_versions_number').on(table.unitId, table.number),
    index('protocol_versions_start').on(table.unitId, table.startsAt),
  ],
)
