import type { Limit } from '@/lib/weaning/protocol'
import { isSame } from './is-same'

/**
 * Whether a value is on the named side of a limit. The value is compared as it is, never rounded for display; only binary rounding is
 * forgiven (see isSame). A value that is not a number meets no limit.
 * @example meetsLimit(105.04, { comparator: 'atMost', value: 105 }) // false
 */
export function meetsLimit(value: number, limit: Limit): boolean {
  if (!Number.isFinite(value) || !Number.isFinite(limit.value)) return false
  const isEqual = isSame(value, limit.value)
  switch (limit.comparator) {
    case 'atMost':
      return isEqual || value < limit.value
    case 'below':
      return !isEqual && value < limit.value
    case 'atLeast':
      return isEqual || value > limit.value
    case 'above':
      return !isEqual && value > limit.value
  }
}
