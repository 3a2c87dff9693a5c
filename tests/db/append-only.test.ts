import { getTableColumns, getTableName, is } from 'drizzle-orm'
import { SQLiteTable } from 'drizzle-orm/sqlite-core'
import { beforeEach, describe, expect, it } from 'vitest'
import type { Db } from '@/db/client'
import * as schema from '@/db/schema'
import { openTestDatabase } from '../helpers/database'
import { countRows, fillAllTables, readAllRows } from '../helpers/fill-tables'

const tables = Object.values(schema).filter((value) => is(value, SQLiteTable))
/** A clinical entry is recognised by its columns, so that a new table without triggers fails here. */
const entryTables = tables
  .filter((table) => 'entryId' in getTableColumns(table) && 'supersedesId' in getTableColumns(table))
  .map(getTableName)
const appendOnlyTables = [...entryTables, 'audit_log', 'idempotency_keys']

let db: Db
beforeEach(() => {
  db = openTestDatabase()
  fillAllTables(db.$client)
})

describe('append-only tables', () => {
  it('finds every kind of clinical entry in the schema', () => {
    expect(entryTables).toEqual(
      expect.arrayContaining(['settings', 'gases', 'screens', 'holds', 'trials', 'decisions', 'airway_events']),
    )
    expect(entryTables.length).toBeGreaterThanOrEqual(11)
  })

  it.each(appendOnlyTables)('%s refuses an update of any column and changes nothing', (table) => {
    const before = readAllRows(db.$client)[table]
    const columns = Object.keys(before?.[0] ?? {})
    expect(columns.length).toBeGreaterThan(1)
    for (const column of columns) {
      const update = db.$client.prepare(`update "${table}" set "${column}" = "${column}"`)
      expect(() => update.run(), column).toThrow(`${table} is append-only`)
    }
    expect(readAllRows(db.$client)[table]).toEqual(before)
  })

  it.each(appendOnlyTables)('%s refuses a deletion', (table) => {
    expect(() => db.$client.exec(`delete from "${table}"`)).toThrow(`${table} is append-only`)
    expect(countRows(db.$client)[table]).toBe(2)
  })

  it.each(appendOnlyTables)('%s refuses a row that replaces another', (table) => {
    const before = readAllRows(db.$client)[table]
    expect(() => db.$client.exec(`insert or replace into "${table}" select * from "${table}"`)).toThrow(`${table} is append-only`)
    expect(readAllRows(db.$client)[table]).toEqual(before)
  })

  it('lets one amendment of a version in and no second one', () => {
    const copy = `insert into gases (id, entry_id, supersedes_id, episode_id, unit_id, ventilator_day, observed_at, recorded_at, recorded_by,
      protocol_version_id, ph, paco2_mmhg, pao2_mmhg, fio2_fraction)
      select ?, entry_id, ?, episode_id, unit_id, ventilator_day, observed_at, recorded_at, recorded_by, protocol_version_id, ph, paco2_mmhg,
      pao2_mmhg, fio2_fraction from gases limit 1`
    const last = db.$client.prepare('select id from gases order by rowid desc limit 1').pluck().get()
    db.$client.prepare(copy).run('third', last)
    expect(() => db.$client.prepare(copy).run('fourth', last)).toThrow('UNIQUE constraint failed: gases.supersedes_id')
  })
})

describe('protocol versions', () => {
  const setState = (state: string) =>
    db.$client.exec(`insert into protocol_versions (id, unit_id, number, content, note, is_default, drafted_at, approved_at)
    select 'p', unit_id, 99, '{}', 'note', ${state} from protocol_versions limit 1`)

  it('a draft can change', () => {
    setState('0, 1, null')
    db.$client.exec(`update protocol_versions set note = 'other' where id = 'p'`)
    expect(db.$client.prepare(`select note from protocol_versions where id = 'p'`).pluck().get()).toBe('other')
  })

  it.each([
    ['an approved version', '0, 1, 2'],
    ['the default version', '1, 1, null'],
  ])('%s is fixed', (_name, state) => {
    setState(state)
    expect(() => db.$client.exec(`update protocol_versions set note = 'other' where id = 'p'`)).toThrow(
      'an approved protocol version is fixed',
    )
  })

  it('no version is ever deleted', () => {
    setState('0, 1, null')
    expect(() => db.$client.exec(`delete from protocol_versions where id = 'p'`)).toThrow('a protocol version is never deleted')
  })
})
