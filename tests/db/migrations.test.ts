import { cpSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { migrate } from 'drizzle-orm/better-sqlite3/migrator'
import { describe, expect, it } from 'vitest'
import { migrateDatabase, openDatabase } from '@/db/client'
import { makeTestFolder, openTestDatabase } from '../helpers/database'
import { countRows, fillAllTables, listTables, readAllRows } from '../helpers/fill-tables'

type Journal = { entries: { idx: number; tag: string; when: number; version: string; breakpoints: boolean }[] }
const FOLDER = 'db/migrations'
const journal = JSON.parse(readFileSync(join(FOLDER, 'meta', '_journal.json'), 'utf8')) as Journal

/** A migrations folder with the first `count` of ours, as an earlier version of the program had it. */
function makeEarlierFolder(count: number): string {
  const folder = makeTestFolder()
  mkdirSync(join(folder, 'meta'))
  for (const { tag } of journal.entries.slice(0, count)) cpSync(join(FOLDER, `${tag}.sql`), join(folder, `${tag}.sql`))
  writeFileSync(join(folder, 'meta', '_journal.json'), JSON.stringify({ ...journal, entries: journal.entries.slice(0, count) }))
  return folder
}

/** A folder with the given migrations, in order. */
function makeFolderOf(migrations: string[]): string {
  const folder = makeTestFolder()
  mkdirSync(join(folder, 'meta'))
  const entries = migrations.map((sql, idx) => {
    writeFileSync(join(folder, `000${idx}_step.sql`), sql)
    return { idx, tag: `000${idx}_step`, when: idx + 1, version: '6', breakpoints: true }
  })
  writeFileSync(join(folder, 'meta', '_journal.json'), JSON.stringify({ version: '7', dialect: 'sqlite', entries }))
  return folder
}

describe('migrations', () => {
  it('are all named in the journal, in order', () => {
    const files = readdirSync(FOLDER).filter((name) => name.endsWith('.sql'))
    expect(journal.entries.map((entry) => `${entry.tag}.sql`)).toEqual(files.sort())
    expect(journal.entries.map((entry) => entry.when)).toEqual(journal.entries.map((entry) => entry.when).sort((a, b) => a - b))
  })

  it.each(journal.entries.map((entry, index) => [entry.tag, index + 1] as const))(
    'a filled database of version %s loses no row and no value on the way to the newest',
    (_tag, count) => {
      const db = openDatabase(':memory:')
      migrateDatabase(db, makeEarlierFolder(count))
      fillAllTables(db.$client)
      const before = readAllRows(db.$client)
      expect(Object.keys(before).length).toBeGreaterThan(20)
      for (const rows of Object.values(before)) expect(rows).toHaveLength(2)

      migrateDatabase(db)

      const after = readAllRows(db.$client)
      for (const [table, rows] of Object.entries(before)) {
        expect(after[table], table).toHaveLength(rows.length)
        rows.forEach((row, index) => expect(after[table]?.[index], table).toMatchObject(row))
      }
      expect(db.$client.pragma('foreign_keys', { simple: true })).toBe(1)
      expect(db.$client.pragma('foreign_key_check')).toEqual([])
      expect(db.$client.pragma('integrity_check', { simple: true })).toBe('ok')
    },
  )

  it('change nothing when they are run again', () => {
    const db = openTestDatabase()
    fillAllTables(db.$client)
    const before = readAllRows(db.$client)
    migrateDatabase(db)
    expect(readAllRows(db.$client)).toEqual(before)
    expect(listTables(db.$client).length).toBeGreaterThan(20)
  })
})

describe('rebuilding a parent table', () => {
  const FIRST = `CREATE TABLE parent (id text PRIMARY KEY NOT NULL, name text);
--> statement-breakpoint
CREATE TABLE child (id text PRIMARY KEY NOT NULL, parent_id text NOT NULL REFERENCES parent(id) ON DELETE CASCADE);`
  /** As the generator writes it when a column becomes not null. */
  const REBUILD = `PRAGMA foreign_keys=OFF;
--> statement-breakpoint
CREATE TABLE __new_parent (id text PRIMARY KEY NOT NULL, name text NOT NULL);
--> statement-breakpoint
INSERT INTO __new_parent(id, name) SELECT id, name FROM parent;
--> statement-breakpoint
DROP TABLE parent;
--> statement-breakpoint
ALTER TABLE __new_parent RENAME TO parent;
--> statement-breakpoint
PRAGMA foreign_keys=ON;`

  function openFilled() {
    const db = openDatabase(':memory:')
    migrateDatabase(db, makeFolderOf([FIRST]))
    db.$client.exec(`insert into parent values ('p', 'name'); insert into child values ('a', 'p'), ('b', 'p')`)
    return db
  }

  it('empties its children when the migrator runs with foreign keys on: the trap', () => {
    const db = openFilled()
    migrate(db, { migrationsFolder: makeFolderOf([FIRST, REBUILD]) })
    expect(countRows(db.$client)).toEqual({ parent: 1, child: 0 })
  })

  it('loses no row the way we run it', () => {
    const db = openFilled()
    migrateDatabase(db, makeFolderOf([FIRST, REBUILD]))
    expect(countRows(db.$client)).toEqual({ parent: 1, child: 2 })
    expect(() => db.$client.exec(`insert into child values ('c', 'nobody')`)).toThrow('FOREIGN KEY constraint failed')
  })

  it('is refused, also at the next start, when it leaves a child without its parent', () => {
    const db = openFilled()
    const folder = makeFolderOf([FIRST, `DELETE FROM parent WHERE id = 'p';`])
    expect(() => migrateDatabase(db, folder)).toThrow('2 broken references')
    expect(() => migrateDatabase(db, folder)).toThrow('2 broken references')
  })

  it('undoes a migration that fails half way', () => {
    const db = openFilled()
    const folder = makeFolderOf([
      FIRST,
      `CREATE TABLE third (id text);\n--> statement-breakpoint\nINSERT INTO missing VALUES (1);`,
    ])
    expect(() => migrateDatabase(db, folder)).toThrow()
    expect(countRows(db.$client)).toEqual({ parent: 1, child: 2 })
  })
})
