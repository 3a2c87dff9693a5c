import { statSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { migrateDatabase, openDatabase } from '@/db/client'
import { makeTestFolder, openTestDatabase, openTestDatabaseFile } from '../helpers/database'

describe('opening the database', () => {
  it('writes ahead, flushes every commit and holds foreign keys', () => {
    const db = openTestDatabaseFile(join(makeTestFolder(), 'new', 'daybreath.db'))
    const pragma = (name: string) => db.$client.pragma(name, { simple: true })
    expect(pragma('journal_mode')).toBe('wal')
    expect(pragma('synchronous')).toBe(2)
    expect(pragma('foreign_keys')).toBe(1)
    expect(pragma('recursive_triggers')).toBe(1)
    expect(pragma('busy_timeout')).toBe(5000)
    db.$client.close()
  })

  it('makes a missing folder that only its owner may read', () => {
    const folder = join(makeTestFolder(), 'new')
    openDatabase(join(folder, 'daybreath.db')).$client.close()
    expect(statSync(folder).mode & 0o777).toBe(0o700)
  })

  it('refuses a child without its parent', () => {
    const db = openTestDatabase()
    const insert = () =>
      db.$client.exec(
        `insert into units (id, hospital_id, name, time_zone, created_at) values ('u', 'nobody', 'A', 'Etc/UTC', 1)`,
      )
    expect(insert).toThrow('FOREIGN KEY constraint failed')
  })

  it('keeps what was entered when it is opened again', () => {
    const file = join(makeTestFolder(), 'daybreath.db')
    const first = openTestDatabaseFile(file)
    first.$client.exec(`insert into hospitals (id, name, created_at) values ('h', 'Invented', 1)`)
    first.$client.close()
    const second = openTestDatabaseFile(file)
    expect(second.$client.prepare('select name from hospitals').pluck().all()).toEqual(['Invented'])
    second.$client.close()
  })

  it('leaves a database alone that a newer program has changed', () => {
    const db = openTestDatabase()
    db.$client.exec(`insert into __drizzle_migrations (hash, created_at) values ('later', 9000000000000)`)
    expect(() => migrateDatabase(db)).toThrow('written by a newer version of Daybreath')
  })
})
