/**
 * The entry with the latest time, or null of an empty list; of equal times the later in the list.
 * @example latest(screens, ({ observedMs }) => observedMs)
 */
export function latest<T>(entries: readonly T[], timeOf: (entry: T) => number): T | null {
  return entries.reduce<T | null>((found, entry) => (found === null || timeOf(entry) >= timeOf(found) ? entry : found), null)
}
