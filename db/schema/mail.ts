import { index, integer, sqliteTable, text, uniqueIndex } from 'drizzle-orm/sqlite-core'
import { MAIL_KINDS, MAIL_STATES } from '@/lib/weaning/vocabulary'
import { people } from './people'
import { units } from './units'

/** Outbox and ledger in one: a message is queued in the transaction that causes it, and a job sends it. */
export const mailLedger = sqliteTable(
  'mail_ledger',
  {
    id: text('id').primaryKey(),
    /** unit (or "account"), local day or moment, kind, recipient: sent once whatever restarts. */
    onceKey: text('once_key').notNull(),
    unitId: text('unit_id').references(() => units.id, { onDelete: 'restrict' }),
    kind: text('kind', { enum: MAIL_KINDS }).notNull(),
    day: text('day').notNull(),
    personId: text('person_id').references(() => people.id, { onDelete: 'restrict' }),
    recipient: text('recipient').notNull(),
    subject: text('subject').notNull(),
    bodyText: text('body_text').notNull(),
    bodyHtml: text('body_html').notNull(),
    messageId: text('message_id').notNull(),
    state: text('state', { enum: MAIL_STATES }).notNull(),
    attempts: integer('attempts').notNull().default(0),
    lastError: text('last_error'),
    queuedAt: integer('queued_at').notNull(),
    nextAttemptAt: integer('next_attempt_at').notNull(),
    claimedAt: integer('claimed_at'),
    sentAt: integer('sent_at'),
  },
  (table) => [
    uniqueIndex('mail_ledger_once').on(table.onceKey),
    index('mail_ledger_unit').on(table.unitId, table.queuedAt),
    index('mail_ledger_state').on(table.state, table.nextAttemptAt),
  ],
)

/** When a unit's scheduled kinds go out, in its own time zone. Minutes after local midnight; null means switched off. */
export const mailSchedules = sqliteTable('mail_schedules', {
  unitId: text('unit_id')
    .primaryKey()
    .references(() => units.id, { onDelete: 'restrict' }),
  morningDueMin: integer('morning_due_min'),
  isWindowEndOn: integer('is_window_end_on', { mode: 'boolean' }).notNull().default(true),
  isDecisionOwedOn: integer('is_decision_owed_on', { mode: 'boolean' }).notNull().default(true),
  version: integer('version').notNull().default(1),
})

export const jobRuns = sqliteTable(
  'job_runs',
  {
    id: text('id').primaryKey(),
    job: text('job').notNull(),
    startedAt: integer('started_at').notNull(),
    endedAt: integer('ended_at'),
    result: text('result', { enum: ['ok', 'failed'] }),
    detail: text('detail'),
  },
  (table) => [index('job_runs_job').on(table.job, table.startedAt)],
)
