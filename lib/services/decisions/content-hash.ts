import 'server-only'
import { createHash } from 'node:crypto'

/** JSON with the keys of every object in order, so that equal content has one text. What is undefined is left out. */
function canonicalJson(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map((item) => canonicalJson(item === undefined ? null : item)).join(',')}]`
  if (typeof value === 'object' && value !== null) {
    const pairs = Object.entries(value)
      .filter(([, held]) => held !== undefined)
      .sort(([a], [b]) => (a < b ? -1 : 1))
      .map(([key, held]) => `${JSON.stringify(key)}:${canonicalJson(held)}`)
    return `{${pairs.join(',')}}`
  }
  return JSON.stringify(value) ?? 'null'
}

/** SHA-256, hexadecimal, over canonical JSON: the same content always has the same hash, whatever the order of its keys. */
export function contentHash(content: unknown): string {
  return createHash('sha256').update(canonicalJson(content)).digest('hex')
}
