import 'server-only'
import Database from 'better-sqlite3'
import { drizzle, type BetterSQLite3Database } from 'drizzle-orm/better-sqlite3'
import { migrate } from 'drizzle-orm/better-sqlite3/migrator'
import { mkdirSync, readFileSync } from 'node:fs'
import { dirname, join } from 'node:path'
import * as schema from './schema'

export type Db = BetterSQLite3Database<typeof schema> & { $client: Database.Database }
/** What a query function takes first: the database or the transaction it runs in. */
export type Tx = Pick<Db, 'select' | 'selectDistinct' | 'insert' | 'update' | 'delete' | 'run' | 'all' | 'get'>

/** Opens a database file (or ':memory:'): WAL, every commit flushed to disk, foreign keys on. */
export function openDatabase(file: string): Db {
  if (file !== ':memory:') mkdirSync(dirname(file), { recursive: true, mode: 0o700 })
  const client = new Database(file)
  client.pragma('journal_mode = WAL')
  client.pragma('synchronous = FULL')
  client.pragma('busy_timeout = 5000')
  client.pragma('foreign_keys = ON')
  // Without this, INSERT OR REPLACE would delete a row past the triggers that refuse a deletion.
  client.pragma('recursive_triggers = ON')
  // 64 MiB of pages in memory, so that a large unit's day is not read from the file again and again.
  client.pragma('cache_size = -65536')
  return drizzle(client, { schema })
}

/**
 * Brings the schema up to date. Foreign keys are off while it runs, because a rebuilt table would otherwise empty its children
 * through their cascades; the check afterwards refuses to go on with a broken reference.
 */
export function migrateDatabase(db: Db, folder = 'db/migrations'): void {
  refuseNewerDatabase(db, folder)
  db.$client.pragma('foreign_keys = OFF')
  migrate(db, { migrationsFolder: folder })
  const broken = db.$client.pragma('foreign_key_check') as unknown[]
  if (broken.length > 0) throw new Error(`The migration left ${broken.length} broken references; the database was not opened.`)
  db.$client.pragma('foreign_keys = ON')
}

/** A database that a newer program has already changed is left alone: this program would misread it. */
function refuseNewerDatabase(db: Db, folder: string): void {
  const known = JSON.parse(readFileSync(join(folder, 'meta', '_journal.json'), 'utf8')) as { entries: { when: number }[] }
  const newest = Math.max(...known.entries.map((entry) => entry.when))
  const hasHistory = db.$client.prepare(`select 1 from sqlite_schema where name = '__drizzle_migrations'`).get() !== undefined
  const applied = hasHistory ? db.$client.prepare('select max(created_at) from __drizzle_migrations').pluck().get() : null
  if (typeof applied === 'number' && applied > newest) {
    throw new Error(
      'This database was written by a newer version of Daybreath. Start that version, or restore a backup made before it.',
    )
  }
}

const shared = globalThis as typeof globalThis & { daybreathDb?: Db }

/** The program's one handle, kept across reloads and shared by all copies of this module. */
export function sharedDatabase(file: string): Db {
  shared.daybreathDb ??= openDatabase(file)
  return shared.daybreathDb
}
