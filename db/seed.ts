import 'server-only'
import { getTableColumns, getTableName } from 'drizzle-orm'
import type { SQLiteTable } from 'drizzle-orm/sqlite-core'
import type { Db } from './client'
import {
  account,
  airwayEvents,
  beds,
  decisions,
  episodes,
  gases,
  holdEnds,
  holdObservations,
  holds,
  hospitals,
  mailSchedules,
  memberships,
  patients,
  people,
  protocolVersions,
  screens,
  settings,
  stays,
  trialEnds,
  trialObservations,
  trials,
  units,
  user,
} from './schema'

/** In an order in which no row comes before one that it refers to. */
const TABLES = {
  hospitals,
  units,
  beds,
  user,
  account,
  people,
  memberships,
  protocolVersions,
  mailSchedules,
  patients,
  stays,
  episodes,
  airwayEvents,
  settings,
  gases,
  screens,
  holds,
  holdObservations,
  holdEnds,
  trials,
  trialObservations,
  trialEnds,
  decisions,
} as const

/** Whole rows for each table: every column given, so that nothing is left to a default. */
export type SeedRows = { [Name in keyof typeof TABLES]: (typeof TABLES)[Name]['$inferSelect'][] }

export function emptySeedRows(): SeedRows {
  return Object.fromEntries(Object.keys(TABLES).map((name) => [name, []])) as unknown as SeedRows
}

/** Inserts many rows with one prepared statement for each table. Call it inside a transaction. Answers how many went into each table. */
export function insertSeedRows(db: Db, rows: SeedRows): Record<string, number> {
  const counts: Record<string, number> = {}
  for (const [name, table] of Object.entries(TABLES)) {
    const ofTable: readonly Record<string, unknown>[] = rows[name as keyof SeedRows]
    insertInto(db, table, ofTable)
    counts[getTableName(table)] = ofTable.length
  }
  return counts
}

function insertInto(db: Db, table: SQLiteTable, rows: readonly Record<string, unknown>[]): void {
  const columns = Object.entries(getTableColumns(table))
  const names = columns.map(([, column]) => `"${column.name}"`).join(', ')
  const statement = db.$client.prepare(
    `insert into "${getTableName(table)}" (${names}) values (${columns.map(() => '?').join(', ')})`,
  )
  for (const row of rows) {
    statement.run(
      columns.map(([key, column]) => {
        const value = row[key]
        if (value === undefined) throw new Error(`A row for ${getTableName(table)} lacks ${key}.`)
        return value === null ? null : column.mapToDriverValue(value)
      }),
    )
  }
}
