import type { StopVerdict } from './observation'

/**
 * The rules met so far and when the first of them was, as DayTrial and DayHold keep them.
 * @example rulesMet(judgeStop(rules, baseline, observations, nowMs)) // { ids: ['breaths_high'], firstMetMs: 1796112360000 }
 */
export function rulesMet(verdicts: readonly StopVerdict[]): { ids: string[]; firstMetMs: number | null } {
  const met = verdicts.filter(({ state }) => state === 'met')
  const times = met.flatMap(({ metAtMs }) => (metAtMs === null ? [] : [metAtMs]))
  return { ids: met.map(({ ruleId }) => ruleId), firstMetMs: times.length > 0 ? Math.min(...times) : null }
}
