import { index, integer, sqliteTable, text } from 'drizzle-orm/sqlite-core'

/** Every change and every refusal, in order. Each row carries a hash over itself and the row before; triggers refuse change. */
export const auditLog = sqliteTable(
  'audit_log',
  {
    seq: integer('seq').primaryKey({ autoIncrement: true }),
    at: integer('at').notNull(),
    actorKind: text('actor_kind', { enum: ['person', 'job', 'system'] }).notNull(),
    /** Person id or job name; null for the program itself and for requests without a session. */
    actorId: text('actor_id'),
    action: text('action').notNull(),
    unitId: text('unit_id'),
    subjectKind: text('subject_kind'),
    subjectId: text('subject_id'),
    requestId: text('request_id').notNull(),
    before: text('before', { mode: 'json' }).$type<unknown>(),
    after: text('after', { mode: 'json' }).$type<unknown>(),
    previousHash: text('previous_hash').notNull(),
    hash: text('hash').notNull(),
  },
  (table) => [index('audit_log_subject').on(table.subjectId), index('audit_log_unit').on(table.unitId, table.seq)],
)

/** The answer to a request that was already carried out; a repeat gets the same answer and changes nothing. */
export const idempotencyKeys = sqliteTable('idempotency_keys', {
  key: text('key').primaryKey(),
  personId: text('person_id').notNull(),
  action: text('action').notNull(),
  inputHash: text('input_hash').notNull(),
  answer: text('answer', { mode: 'json' }).$type<unknown>().notNull(),
  createdAt: integer('created_at').notNull(),
})
