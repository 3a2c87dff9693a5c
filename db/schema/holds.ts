import { sql } from 'drizzle-orm'
import { index, sqliteTable, text, uniqueIndex, type AnySQLiteColumn } from 'drizzle-orm/sqlite-core'
import type { ObservedReadings } from '@/lib/weaning/readings'
import { HOLD_OUTCOMES, HOLD_STARTS, type HoldSafetyItem } from '@/lib/weaning/vocabulary'
import { entryColumns } from './columns'

/** A continuous infusion at the moment of the hold. */
export type Infusion = { drug: string; rate: number; unit: string; purpose: 'sedation' | 'pain' }
export type Restart = { drug: string; unit: string; rateBefore: number; rate: number }

export const holds = sqliteTable(
  'holds',
  {
    ...entryColumns((): AnySQLiteColumn => holds.id),
    start: text('start', { enum: HOLD_STARTS }).notNull(),
    /** Answer to each safety item: true means the item is present and the hold unsafe. */
    safety: text('safety', { mode: 'json' }).$type<Partial<Record<HoldSafetyItem, boolean>>>(),
    infusions: text('infusions', { mode: 'json' }).$type<Infusion[]>().notNull(),
    note: text('note'),
  },
  (table) => [
    index('holds_episode').on(table.episodeId, table.ventilatorDay),
    index('holds_unit_day').on(table.unitId, table.ventilatorDay),
  ],
)

export const holdObservations = sqliteTable(
  'hold_observations',
  {
    ...entryColumns((): AnySQLiteColumn => holdObservations.id),
    holdId: text('hold_id')
      .notNull()
      .references(() => holds.id, { onDelete: 'restrict' }),
    readings: text('readings', { mode: 'json' }).$type<ObservedReadings>().notNull(),
    opensEyesToVoice: text('opens_eyes_to_voice', { enum: ['yes', 'no'] }),
  },
  (table) => [index('hold_observations_hold').on(table.holdId, table.observedAt)],
)

export const holdEnds = sqliteTable(
  'hold_ends',
  {
    ...entryColumns((): AnySQLiteColumn => holdEnds.id),
    holdId: text('hold_id')
      .notNull()
      .references(() => holds.id, { onDelete: 'restrict' }),
    outcome: text('outcome', { enum: HOLD_OUTCOMES }).notNull(),
    rulesMet: text('rules_met', { mode: 'json' }).$type<string[]>().notNull(),
    restarts: text('restarts', { mode: 'json' }).$type<Restart[]>().notNull(),
    note: text('note'),
  },
  (table) => [
    uniqueIndex('hold_ends_first')
      .on(table.holdId)
      .where(sql`entry_version = 1`),
    index('hold_ends_hold').on(table.holdId),
  ],
)
