import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { onTestFinished } from 'vitest'
import { migrateDatabase, openDatabase, type Db } from '@/db/client'

/** A fresh in-memory database with all our migrations, closed by the process that holds it. */
export function openTestDatabase(): Db {
  const db = openDatabase(':memory:')
  migrateDatabase(db)
  return db
}

/** A database file with all our migrations; opening an existing file keeps what is in it. The caller closes it (`db.$client.close()`). */
export function openTestDatabaseFile(path: string): Db {
  const db = openDatabase(path)
  migrateDatabase(db)
  return db
}

/** An empty folder of this test's own, removed when the test is over. Call it inside a test. */
export function makeTestFolder(): string {
  const folder = mkdtempSync(join(tmpdir(), 'daybreath-test-'))
  onTestFinished(() => rmSync(folder, { recursive: true, force: true }))
  return folder
}
