import { changeFromBaseline, type ChangeKind } from './change-from-baseline'
import { meetsLimit } from './meets-limit'

export type Change = ChangeKind & { comparator: 'atLeast' | 'above'; by: number }

/**
 * Whether a value has risen or fallen from its baseline by at least (or by more than) an amount. null when it cannot be told.
 * @example meetsChange(7.42, 7.35, { direction: 'fall', comparator: 'atLeast', by: 0.07, as: 'absolute' }) // true
 */
export function meetsChange(baseline: number, value: number, change: Change): boolean | null {
  const size = changeFromBaseline(baseline, value, change)
  return size.known ? meetsLimit(size.value, { comparator: change.comparator, value: change.by }) : null
}
