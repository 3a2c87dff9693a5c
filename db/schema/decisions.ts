import { sql } from 'drizzle-orm'
import { check, index, integer, sqliteTable, text, type AnySQLiteColumn } from 'drizzle-orm/sqlite-core'
import { DECISION_CHOICES, SUPPORTS_AFTER, type NotTodayReason } from '@/lib/weaning/vocabulary'
import { entryColumns } from './columns'

/** A signed decision: recordedBy is the signer, recordedAt the moment of signing. */
export const decisions = sqliteTable(
  'decisions',
  {
    ...entryColumns((): AnySQLiteColumn => decisions.id),
    choice: text('choice', { enum: DECISION_CHOICES }).notNull(),
    reasons: text('reasons', { mode: 'json' }).$type<NotTodayReason[]>().notNull(),
    note: text('note'),
    lookAgainAt: integer('look_again_at'),
    supportAfter: text('support_after', { enum: SUPPORTS_AFTER }),
    steroidsPlanned: integer('steroids_planned', { mode: 'boolean' }),
    /** What stood on the page when it was signed, and a hash over it and the choice. */
    evidence: text('evidence', { mode: 'json' }).$type<Record<string, unknown>>().notNull(),
    contentHash: text('content_hash').notNull(),
    /** The sentence that was signed. */
    statement: text('statement').notNull(),
  },
  (table) => [
    index('decisions_episode').on(table.episodeId, table.ventilatorDay),
    index('decisions_unit_day').on(table.unitId, table.ventilatorDay),
    check('decisions_look_again', sql`${table.choice} <> 'not_today' or ${table.lookAgainAt} is not null`),
  ],
)
