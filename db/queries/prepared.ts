import 'server-only'
import type { Tx } from '../client'

/**
 * Statements that are prepared once for each handle and then only run: building a query costs several times as much as running it.
 * A transaction counts as a handle of its own and is forgotten with it.
 */
export function preparedOnce<Statements>(prepare: (tx: Tx) => Statements): (tx: Tx) => Statements {
  const known = new WeakMap<Tx, Statements>()
  return (tx) => {
    const earlier = known.get(tx)
    if (earlier !== undefined) return earlier
    const made = prepare(tx)
    known.set(tx, made)
    return made
  }
}
