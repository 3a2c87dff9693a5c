import type { HoldSafetyItem } from '@/lib/weaning/vocabulary'

/** unsafe: an item is present. incomplete: none is, but some are not answered. safe: every item answered with no. */
export type HoldSafetyVerdict = {
  result: 'safe' | 'unsafe' | 'incomplete'
  present: HoldSafetyItem[]
  notAssessed: HoldSafetyItem[]
}

/**
 * Judges the safety screen before a sedation hold. An item that is not answered never counts as absent.
 * Source: awakening trial safety screen of Girard 2008, doi:10.1016/S0140-6736(08)60105-1 (from a later reuse of that protocol).
 * @example judgeSafety(['raised_icp'], { raised_icp: true }).result // 'unsafe'
 */
export function judgeSafety(
  items: readonly HoldSafetyItem[],
  answers: Partial<Record<HoldSafetyItem, boolean | null>>,
): HoldSafetyVerdict {
  const present = items.filter((item) => answers[item] === true)
  const notAssessed = items.filter((item) => answers[item] !== true && answers[item] !== false)
  if (present.length > 0) return { result: 'unsafe', present, notAssessed }
  return { result: notAssessed.length > 0 ? 'incomplete' : 'safe', present, notAssessed }
}
