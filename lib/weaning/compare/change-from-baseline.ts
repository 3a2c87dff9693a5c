import { unknownReading } from '@/lib/weaning/answer'
import type { Reading } from '@/lib/weaning/readings'

/** A rise or fall from baseline, in percent of the baseline or in the reading's own unit. */
export type ChangeKind = { direction: 'rise' | 'fall'; as: 'percent' | 'absolute' }

/**
 * The size of a rise or fall from baseline, in percent of the baseline or in the reading's own unit; negative when it went the other way.
 * @example changeFromBaseline(60, 75, { direction: 'rise', as: 'percent' }) // { known: true, value: 25 }
 */
export function changeFromBaseline(baseline: number, value: number, change: ChangeKind): Reading {
  if (!Number.isFinite(baseline) || !Number.isFinite(value)) return unknownReading('implausible')
  const size = change.direction === 'rise' ? value - baseline : baseline - value
  if (change.as === 'absolute') return { known: true, value: size }
  return baseline > 0 ? { known: true, value: (size * 100) / baseline } : unknownReading('implausible')
}
