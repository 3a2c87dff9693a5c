import type { StopRule } from '@/lib/weaning/protocol'
import type { ObservedReadings } from '@/lib/weaning/readings'
import { lookByRule } from './look-by-rule'
import type { Observation, StopVerdict } from './observation'

const MINUTE_MS = 60_000

/**
 * Judges each stop rule of a trial, or fail rule of a hold, by the looks so far. Looks later than `nowMs` do not count.
 * A sustained limit is met when the looks beyond it, first to last and none inside between them, span its minutes: only looks count,
 * never the clock. A look without the value neither breaks nor lengthens a run. Signs are counted at one look, not added up over several.
 * A rule once met stays met, so that a later calm look does not hide it. Source: each rule carries its own.
 * @example judgeStop(defaultProtocol.trial.stopRules, baseline, observations, nowMs).filter(({ state }) => state === 'met')
 */
export function judgeStop(
  rules: readonly StopRule[],
  baseline: ObservedReadings | null,
  observations: readonly Observation[],
  nowMs: number,
): StopVerdict[] {
  const looks = observations.filter(({ atMs }) => atMs <= nowMs).sort((a, b) => a.atMs - b.atMs)
  return rules.map((rule) => judgeRule(rule, baseline, looks))
}

function judgeRule(rule: StopRule, baseline: ObservedReadings | null, looks: Observation[]): StopVerdict {
  const sustainedMs = sustainedMin(rule) * MINUTE_MS
  const verdict: StopVerdict = { ...NOTHING_SEEN, ruleId: rule.id, rule }
  let runSinceMs: number | null = null
  let isPartly = false
  for (const { atMs, readings } of looks) {
    const look = lookByRule(rule, baseline, readings)
    if (look === null) continue
    runSinceMs = look.isBeyond ? (runSinceMs ?? atMs) : null
    isPartly = look.isPartly
    Object.assign(verdict, { lastValue: look.value, lastLookMs: atMs, isBeyondNow: look.isBeyond })
    if (verdict.metAtMs === null && runSinceMs !== null && atMs - runSinceMs >= sustainedMs) {
      Object.assign(verdict, { metAtMs: atMs, sinceMs: runSinceMs })
    }
  }
  if (verdict.metAtMs !== null) return { ...verdict, state: 'met' }
  if (verdict.lastLookMs === null) return verdict
  if (runSinceMs !== null) return { ...verdict, state: 'near', sinceMs: runSinceMs, reachedAtMs: runSinceMs + sustainedMs }
  return { ...verdict, state: isPartly ? 'near' : 'clear' }
}

const NOTHING_SEEN: Omit<StopVerdict, 'ruleId' | 'rule'> = {
  state: 'unknown',
  sinceMs: null,
  metAtMs: null,
  reachedAtMs: null,
  isBeyondNow: false,
  lastValue: null,
  lastLookMs: null,
}

function sustainedMin(rule: StopRule): number {
  if (rule.kind === 'limit' || rule.kind === 'change') return rule.sustainedMin
  return rule.kind === 'sign' ? (rule.sustainedMin ?? 0) : 0
}
