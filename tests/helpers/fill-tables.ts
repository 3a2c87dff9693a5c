import type Database from 'better-sqlite3'

type Client = Database.Database
type Column = { name: string; type: string; notnull: 0 | 1; dflt_value: string | null; pk: number }
type ForeignKey = { table: string; from: string; to: string | null }
type Value = string | number | null

const ROWS = 2

/** Our tables, without SQLite's and the migrator's own. */
export function listTables(client: Client): string[] {
  const sql = `select name from sqlite_schema where type = 'table' and name not like 'sqlite_%' and name not like '\\_\\_%' escape '\\' order by name`
  return client.prepare(sql).pluck().all() as string[]
}

/** Number of rows of every table. */
export function countRows(client: Client): Record<string, number> {
  return Object.fromEntries(
    listTables(client).map((table) => [table, client.prepare(`select count(*) from "${table}"`).pluck().get() as number]),
  )
}

/** Every row of every table, with the columns that the table has now, for a comparison of contents. */
export function readAllRows(client: Client): Record<string, Record<string, Value>[]> {
  return Object.fromEntries(
    listTables(client).map((table) => [
      table,
      client.prepare(`select * from "${table}" order by rowid`).all() as Record<string, Value>[],
    ]),
  )
}

/**
 * Puts two rows into every table of whatever schema the database has, parents before children. The first row carries only what must
 * be there; the second carries everything and supersedes or follows the first where a table refers to itself.
 */
export function fillAllTables(client: Client): void {
  const tables = listTables(client)
  const done = new Set<string>()
  while (done.size < tables.length) {
    const ready = tables.filter(
      (table) => !done.has(table) && parentsOf(client, table).every((parent) => parent === table || done.has(parent)),
    )
    if (ready.length === 0)
      throw new Error(`These tables refer to each other in a circle: ${tables.filter((table) => !done.has(table)).join(', ')}`)
    for (const table of ready) {
      for (let row = 0; row < ROWS; row += 1) insertRow(client, table, row)
      done.add(table)
    }
  }
}

const foreignKeysOf = (client: Client, table: string) => client.pragma(`foreign_key_list("${table}")`) as ForeignKey[]
const parentsOf = (client: Client, table: string) => foreignKeysOf(client, table).map((key) => key.table)

function insertRow(client: Client, table: string, row: number): void {
  if (row > 0 && tryInsert(client, table, row, true)) return
  if (!tryInsert(client, table, row, false)) throw new Error(`No row fits the checks of ${table}: teach the filler its rule.`)
}

/** Inserts one row; false when a CHECK of the table refuses it. */
function tryInsert(client: Client, table: string, row: number, isComplete: boolean): boolean {
  const keys = foreignKeysOf(client, table)
  const values: Record<string, Value> = {}
  for (const column of client.pragma(`table_info("${table}")`) as Column[]) {
    const isWanted = isComplete || column.pk > 0 || (column.notnull === 1 && column.dflt_value === null)
    if (!isWanted) continue
    const key = keys.find((candidate) => candidate.from === column.name)
    values[column.name] = key ? parentValue(client, key, row, key.table === table) : plainValue(table, column, row)
  }
  const names = Object.keys(values)
  const sql = `insert into "${table}" (${names.map((name) => `"${name}"`).join(', ')}) values (${names.map(() => '?').join(', ')})`
  try {
    client.prepare(sql).run(...names.map((name) => values[name]))
    return true
  } catch (error) {
    if (error instanceof Error && 'code' in error && error.code === 'SQLITE_CONSTRAINT_CHECK') return false
    throw error
  }
}

function parentValue(client: Client, key: ForeignKey, row: number, isSelf: boolean): Value {
  const column = key.to ?? 'id'
  return client
    .prepare(`select "${column}" from "${key.table}" limit 1 offset ?`)
    .pluck()
    .get(isSelf ? row - 1 : row) as Value
}

/** A value that differs from row to row; small whole numbers, so that most limits hold. */
function plainValue(table: string, column: Column, row: number): Value {
  if (/INT|REAL|NUM/i.test(column.type)) return row + 1
  return `${table} ${column.name} ${row}`
}
