import type { Limit } from './protocol'

/**
 * A limit value in text, with at least the usual decimals and never fewer than it has, so that 7.5 never reads as 8.
 * @example limitText(0.5, 2) // '0.50'
 */
export function limitText(value: number, decimals: number): string {
  const fixed = value.toFixed(decimals)
  const text = Number(fixed) === value ? fixed : String(value)
  return text.replace('-', '\u2212')
}

/** A comparator with its value in words: "0.50 or less", "above 35". */
export function limitWords(limit: Limit, decimals: number): string {
  const value = limitText(limit.value, decimals)
  switch (limit.comparator) {
    case 'atMost':
      return `${value} or less`
    case 'atLeast':
      return `${value} or more`
    case 'below':
      return `below ${value}`
    case 'above':
      return `above ${value}`
  }
}
