import 'server-only'
import type { Db } from '../client'

const known = new WeakMap<Db, () => string>()

/**
 * A text that differs whenever anything in the database has changed: by this handle (total_changes) or by any other process
 * (data_version). Equal marks mean that every read gives what it gave before.
 */
export function readChangeMark(db: Db): string {
  let read = known.get(db)
  if (read === undefined) {
    const own = db.$client.prepare('select total_changes()').pluck()
    read = () => `${String(db.$client.pragma('data_version', { simple: true }))}:${String(own.get())}`
    known.set(db, read)
  }
  return read()
}
