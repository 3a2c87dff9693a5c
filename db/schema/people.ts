import { sql } from 'drizzle-orm'
import { index, integer, sqliteTable, text, uniqueIndex } from 'drizzle-orm/sqlite-core'
import { ACCOUNT_LINK_KINDS, CLINICAL_ROLES } from '@/lib/weaning/vocabulary'
import { user } from './auth'
import { hospitals, units } from './units'

/** One row for each account; the id is the account's id. Sign-in lives in `user`, rights live here. */
export const people = sqliteTable(
  'people',
  {
    id: text('id')
      .primaryKey()
      .references(() => user.id, { onDelete: 'restrict' }),
    hospitalId: text('hospital_id')
      .notNull()
      .references(() => hospitals.id, { onDelete: 'restrict' }),
    name: text('name').notNull(),
    isAdministrator: integer('is_administrator', { mode: 'boolean' })
      .notNull()
      .default(sql`0`),
    createdAt: integer('created_at').notNull(),
    deactivatedAt: integer('deactivated_at'),
    version: integer('version').notNull().default(1),
  },
  (table) => [index('people_hospital').on(table.hospitalId)],
)

/** One role of one person in one unit. Ended, never deleted. */
export const memberships = sqliteTable(
  'memberships',
  {
    id: text('id').primaryKey(),
    personId: text('person_id')
      .notNull()
      .references(() => people.id, { onDelete: 'restrict' }),
    unitId: text('unit_id')
      .notNull()
      .references(() => units.id, { onDelete: 'restrict' }),
    role: text('role', { enum: CLINICAL_ROLES }).notNull(),
    startedAt: integer('started_at').notNull(),
    endedAt: integer('ended_at'),
  },
  (table) => [
    index('memberships_person').on(table.personId),
    index('memberships_unit').on(table.unitId),
    uniqueIndex('memberships_open')
      .on(table.personId, table.unitId, table.role)
      .where(sql`ended_at is null`),
  ],
)

/** One-time links: first administrator, invitation. Only a hash of the token is kept. */
export const accountLinks = sqliteTable('account_links', {
  id: text('id').primaryKey(),
  kind: text('kind', { enum: ACCOUNT_LINK_KINDS }).notNull(),
  personId: text('person_id').references(() => people.id, { onDelete: 'restrict' }),
  tokenHash: text('token_hash').notNull().unique(),
  createdAt: integer('created_at').notNull(),
  expiresAt: integer('expires_at').notNull(),
  usedAt: integer('used_at'),
})

/** What a session needs beyond better-auth's own row: when a person last did something, and whether the screen is locked. */
export const sessionStates = sqliteTable('session_states', {
  sessionId: text('session_id').primaryKey(),
  personId: text('person_id')
    .notNull()
    .references(() => people.id, { onDelete: 'restrict' }),
  lastActiveAt: integer('last_active_at').notNull(),
  lockedAt: integer('locked_at'),
  failedUnlocks: integer('failed_unlocks').notNull().default(0),
})
