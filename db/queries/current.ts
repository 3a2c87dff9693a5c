import 'server-only'
import { sql, type SQL } from 'drizzle-orm'
import type { SQLiteColumn, SQLiteTable } from 'drizzle-orm/sqlite-core'

type EntryTable = SQLiteTable & { id: SQLiteColumn; isWithdrawn: SQLiteColumn }

/** Only the version that no other one supersedes, and only when it was not withdrawn. */
export function isCurrent(table: EntryTable): SQL {
  return sql`${table.isWithdrawn} = 0 and not exists (select 1 from ${table} newer where newer.supersedes_id = ${table.id})`
}

/** The column's value is one of a JSON array of texts given as one parameter, so that a prepared statement takes a list of any length. */
export function isOneOf(column: SQLiteColumn, jsonTexts: SQL): SQL {
  return sql`${column} in (select value from json_each(${jsonTexts}))`
}
