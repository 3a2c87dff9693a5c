import { existsSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import Database from 'better-sqlite3'
import { describe, expect, it } from 'vitest'
import { backUp, checkDatabase } from '@/lib/start/backup.mjs'
import { makeTestFolder, openTestDatabaseFile } from '../helpers/database'
import { fillAllTables, readAllRows } from '../helpers/fill-tables'

const NOW = new Date('2026-03-03T08:00:00.500Z')

function makeSource() {
  const folder = makeTestFolder()
  const file = join(folder, 'daybreath.db')
  const db = openTestDatabaseFile(file)
  fillAllTables(db.$client)
  return { folder, file, db, backups: join(folder, 'backups') }
}

describe('backup', () => {
  it('copies everything while the database is open and written to, into one checked file', async () => {
    const { db, file, backups } = makeSource()
    const { file: copy, counts } = await backUp(Database, file, backups, NOW)
    expect(copy).toBe(join(backups, '2026-03-03T08-00-00Z.db'))
    expect(statSync(copy).mode & 0o777).toBe(0o600)
    expect(counts).toMatchObject({ patients: 2, screens: 2, decisions: 2, audit_log: 2 })
    expect(readdirSync(backups)).toEqual(['2026-03-03T08-00-00Z.db'])
    const opened = new Database(copy, { readonly: true })
    expect(readAllRows(opened)).toEqual(readAllRows(db.$client))
    opened.close()
    db.$client.close()
  })

  it('includes rows that only the write-ahead file holds', async () => {
    const { db, file, backups } = makeSource()
    db.$client.pragma('wal_autocheckpoint = 0')
    db.$client.exec(`insert into hospitals (id, name, created_at) values ('late', 'Late', 1)`)
    const { file: copy } = await backUp(Database, file, backups, NOW)
    const opened = new Database(copy, { readonly: true })
    expect(opened.prepare(`select name from hospitals where id = 'late'`).pluck().get()).toBe('Late')
    opened.close()
    db.$client.close()
  })

  it('can be opened as the database of a server again', async () => {
    const { db, file, backups } = makeSource()
    const { file: copy } = await backUp(Database, file, backups, NOW)
    db.$client.close()
    const restored = openTestDatabaseFile(copy)
    expect(restored.$client.prepare('select count(*) from patients').pluck().get()).toBe(2)
    restored.$client.close()
  })

  it('refuses and removes a copy whose references are broken', async () => {
    const { db, file, backups } = makeSource()
    db.$client.pragma('foreign_keys = OFF')
    db.$client.exec(`insert into beds (id, unit_id, label, sort_order, created_at) values ('b', 'nobody', 'x', 1, 1)`)
    await expect(backUp(Database, file, backups, NOW)).rejects.toThrow('1 broken references')
    expect(readdirSync(backups)).toEqual([])
    db.$client.close()
  })

  it('says when there is no database, and makes none', async () => {
    const folder = makeTestFolder()
    await expect(backUp(Database, join(folder, 'no.db'), join(folder, 'backups'), NOW)).rejects.toThrow('There is no database at')
    expect(existsSync(join(folder, 'no.db'))).toBe(false)
  })

  it('never overwrites an earlier backup', async () => {
    const { db, file, backups } = makeSource()
    await backUp(Database, file, backups, NOW)
    await expect(backUp(Database, file, backups, NOW)).rejects.toThrow('exists already')
    db.$client.close()
  })

  it('refuses a damaged file and leaves nothing behind', async () => {
    const { db, file, backups } = makeSource()
    db.$client.pragma('wal_checkpoint(TRUNCATE)')
    db.$client.close()
    expect(checkDatabase(Database, file).problems).toEqual([])
    const bytes = readFileSync(file)
    bytes.fill(0xff, 4096 * 3, 4096 * 12)
    writeFileSync(file, bytes)
    await expect(backUp(Database, file, backups, NOW)).rejects.toThrow(/not sound|could not be copied/)
    expect(readdirSync(backups)).toEqual([])
  })
})
