const MINUTE_MS = 60_000

/**
 * Whether a sedation hold counts as tolerated: no fail rule met, and either the eyes opened to voice or the hold has lasted long enough.
 * Variant: 4 h by default. Source: awakening trial of Girard 2008, doi:10.1016/S0140-6736(08)60105-1 (from a later reuse of that protocol).
 * @example isTolerated({ startedMs: 0, atMs: 14_700_000, opensEyesToVoice: false, failRulesMet: [], toleratedAfterMin: 240 }) // true
 */
export function isTolerated(input: {
  startedMs: number
  atMs: number
  opensEyesToVoice: boolean
  failRulesMet: readonly string[]
  toleratedAfterMin: number
}): boolean {
  if (input.failRulesMet.length > 0) return false
  return input.opensEyesToVoice || input.atMs - input.startedMs >= input.toleratedAfterMin * MINUTE_MS
}
