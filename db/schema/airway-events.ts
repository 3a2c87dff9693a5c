import { index, sqliteTable, text, type AnySQLiteColumn } from 'drizzle-orm/sqlite-core'
import { AIRWAY_EVENTS, SUPPORTS_AFTER } from '@/lib/weaning/vocabulary'
import { entryColumns } from './columns'

export const airwayEvents = sqliteTable(
  'airway_events',
  {
    ...entryColumns((): AnySQLiteColumn => airwayEvents.id),
    event: text('event', { enum: AIRWAY_EVENTS }).notNull(),
    reason: text('reason'),
    supportAfter: text('support_after', { enum: SUPPORTS_AFTER }),
  },
  (table) => [
    index('airway_events_episode').on(table.episodeId, table.observedAt),
    index('airway_events_unit').on(table.unitId, table.observedAt),
  ],
)
