/** A stream of chance that the same seed always repeats. Not for secrets. */
export type Random = {
  /** Evenly from 0 up to, not including, 1. */
  next: () => number
  /** Evenly between two numbers. */
  between: (low: number, high: number) => number
  /** A whole number from low to high, both included. */
  whole: (low: number, high: number) => number
  /** Bell-shaped, kept within four spreads of the middle. */
  normal: (middle: number, spread: number) => number
  chance: (probability: number) => boolean
  pick: <T>(from: readonly T[]) => T
  /** 16 characters of base 36. */
  id: () => string
}

/** Mulberry32: a small published generator, good enough for invented patients. */
function stream(seed: number): () => number {
  let state = seed >>> 0
  return () => {
    state = (state + 0x6d2b79f5) >>> 0
    let mixed = Math.imul(state ^ (state >>> 15), state | 1)
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61)
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4_294_967_296
  }
}

export function makeRandom(seed: number): Random {
  const next = stream(seed)
  const nextId = stream(seed ^ 0x5bd1e995)
  const between = (low: number, high: number) => low + next() * (high - low)
  return {
    next,
    between,
    whole: (low, high) => Math.floor(between(low, high + 1)),
    normal: (middle, spread) => {
      const bell = Math.sqrt(-2 * Math.log(1 - next())) * Math.cos(2 * Math.PI * next())
      return middle + spread * Math.max(-4, Math.min(4, bell))
    },
    chance: (probability) => next() < probability,
    pick: <T>(from: readonly T[]): T => {
      const picked = from[Math.floor(next() * from.length)]
      if (picked === undefined) throw new Error('There is nothing to pick from.')
      return picked
    },
    id: () => Array.from({ length: 16 }, () => Math.floor(nextId() * 36).toString(36)).join(''),
  }
}
