import type { Limit } from '@/lib/weaning/protocol'
import type { ScreenCriterion } from '@/lib/weaning/vocabulary'
import type { Provenance } from './provenance'

/** One item of a published readiness list. All items must hold; items with the same `either` are alternatives of each other. */
export type ReadinessItem = {
  item: string
  unit: string
  /** null for an item that is judged by word, not by number. */
  limit: Limit | null
  /** The criterion of our screen that asks the same in the same unit; null when none does. */
  criterion: ScreenCriterion | null
  either?: string
  provenance: Provenance
}
export type ReadinessList = { id: string; name: string; source: string; items: readonly ReadinessItem[] }

type Options = { criterion?: ScreenCriterion; either?: string }

/** An item judged by number. */
export function measured(
  item: string,
  unit: string,
  comparator: Limit['comparator'],
  value: number,
  provenance: Provenance,
  options: Options = {},
): ReadinessItem {
  return { item, unit, limit: { comparator, value }, criterion: null, provenance, ...options }
}

/** An item judged by word. */
export function judged(item: string, provenance: Provenance, options: Options = {}): ReadinessItem {
  return { item, unit: '', limit: null, criterion: null, provenance, ...options }
}
