import { limitText } from '@/lib/weaning/limit-words'
import type { Limit } from '@/lib/weaning/protocol'
import { meetsLimit } from './meets-limit'

/**
 * A value in text beside its limits, with as many more decimals (up to six) as it takes to stand on the same side when rounded:
 * an RSBI of 105.04 beside "105 or less" reads 105.04, not 105.0.
 * @example valueBesideLimit(105.04, 1, [{ comparator: 'atMost', value: 105 }]) // '105.04'
 */
export function valueBesideLimit(value: number, decimals: number, limits: readonly Limit[]): string {
  for (let shown = decimals; shown <= 6; shown += 1) {
    const rounded = Number(value.toFixed(shown))
    if (limits.every((limit) => meetsLimit(rounded, limit) === meetsLimit(value, limit))) return limitText(rounded, decimals)
  }
  return limitText(value, decimals)
}
