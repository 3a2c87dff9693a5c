// npm run backup: a consistent copy of the running database, opened and checked before it counts.
import { chmodSync, existsSync, mkdirSync, renameSync, rmSync } from 'node:fs'
import { join, resolve } from 'node:path'
import { main, Refusal, ROOT, say } from './process.mjs'
import { setup } from './setup.mjs'
import { loadSettings } from './start.mjs'

const COUNTED = ['patients', 'episodes', 'screens', 'holds', 'trials', 'decisions', 'audit_log']

/** Time as part of a file name: 2026-12-01T08-30-00Z. */
function fileTime(now) {
  return now
    .toISOString()
    .replace(/\.\d+Z$/, 'Z')
    .replaceAll(':', '-')
}

/**
 * Checks a database file and counts its main tables.
 * @returns {{ problems: string[], counts: Record<string, number> }}
 */
export function checkDatabase(Database, file) {
  const db = new Database(file, { readonly: true, fileMustExist: true })
  try {
    const integrity = db.pragma('integrity_check').map((row) => row.integrity_check)
    const broken = db.pragma('foreign_key_check')
    const problems = integrity.filter((line) => line !== 'ok')
    if (broken.length > 0) problems.push(`${broken.length} broken references`)
    const counts = {}
    for (const table of COUNTED) counts[table] = db.prepare(`select count(*) from ${table}`).pluck().get()
    return { problems, counts }
  } finally {
    db.close()
  }
}

/**
 * Copies the database, also while a server writes to it, and checks the copy. A copy that fails the check is removed.
 * @returns {Promise<{ file: string, counts: Record<string, number> }>}
 */
export async function backUp(Database, source, folder, now = new Date()) {
  if (!existsSync(source)) throw new Refusal(`There is no database at ${source}.`)
  mkdirSync(folder, { recursive: true, mode: 0o700 })
  const file = join(folder, `${fileTime(now)}.db`)
  if (existsSync(file)) throw new Refusal(`${file} exists already.`)
  const unchecked = `${file}.unchecked`
  try {
    await copyDatabase(Database, source, unchecked)
    const { problems, counts } = checkDatabase(Database, unchecked)
    if (problems.length > 0) throw new Refusal(`The copy is not sound and was removed: ${problems.join('; ')}`)
    chmodSync(unchecked, 0o600)
    renameSync(unchecked, file)
    return { file, counts }
  } catch (error) {
    if (error instanceof Refusal) throw error
    throw new Refusal(`The database could not be copied soundly: ${error instanceof Error ? error.message : error}`)
  } finally {
    for (const end of ['', '-wal', '-shm', '-journal']) rmSync(unchecked + end, { force: true })
  }
}

async function copyDatabase(Database, source, target) {
  const db = new Database(source, { readonly: true, fileMustExist: true })
  try {
    await db.backup(target)
  } finally {
    db.close()
  }
  makeSelfContained(Database, target)
}

/** One plain file without companions, so that copying it elsewhere copies everything. */
function makeSelfContained(Database, file) {
  const db = new Database(file)
  db.pragma('journal_mode = DELETE')
  db.close()
}

async function backup() {
  await setup()
  loadSettings()
  const { default: Database } = await import('better-sqlite3')
  const source = resolve(ROOT, process.env.DAYBREATH_DATABASE || 'data/daybreath.db')
  const { file, counts } = await backUp(Database, source, join(ROOT, 'data', 'backups'))
  say(`Backup written and checked: ${file}`)
  for (const [table, count] of Object.entries(counts)) say(`  ${table.padEnd(10)} ${count}`)
}

main(import.meta.url, backup)
