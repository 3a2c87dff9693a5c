import { sql } from 'drizzle-orm'
import { check, index, sqliteTable, text, type AnySQLiteColumn } from 'drizzle-orm/sqlite-core'
import type { ScreenReadings } from '@/lib/weaning/readings'
import type { ScreenVerdict } from '@/lib/weaning/screen/verdict'
import { EXCUSE_REASONS, SCREEN_RESULTS } from '@/lib/weaning/vocabulary'
import { entryColumns } from './columns'

export const screens = sqliteTable(
  'screens',
  {
    ...entryColumns((): AnySQLiteColumn => screens.id),
    result: text('result', { enum: SCREEN_RESULTS }).notNull(),
    excuse: text('excuse', { enum: EXCUSE_REASONS }),
    note: text('note'),
    readings: text('readings', { mode: 'json' }).$type<ScreenReadings>(),
    /** The verdict as the protocol version of that moment gave it; never judged again. */
    verdict: text('verdict', { mode: 'json' }).$type<ScreenVerdict>(),
  },
  (table) => [
    index('screens_episode').on(table.episodeId, table.ventilatorDay),
    index('screens_unit_day').on(table.unitId, table.ventilatorDay),
    check('screens_excuse', sql`(${table.result} = 'excused') = (${table.excuse} is not null)`),
  ],
)
