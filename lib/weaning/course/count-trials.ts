import type { TrialOutcome } from '@/lib/weaning/vocabulary'

/** outcome null while the trial runs. */
export type ReviewTrial = { ventilatorDay: string; outcome: TrialOutcome | null }
export type TrialCounts = { started: number; passed: number; failed: number; stopped: number; running: number }

const NOTHING: TrialCounts = { started: 0, passed: 0, failed: 0, stopped: 0, running: 0 }

/**
 * Breathing trials by the month of the ventilator day in which they began, and how they ended.
 * @example countTrials([{ ventilatorDay: '2026-11-03', outcome: 'passed' }]).of('2026-11').passed // 1
 */
export function countTrials(trials: readonly ReviewTrial[]) {
  const months = new Map<string, TrialCounts>()
  for (const { ventilatorDay, outcome } of trials) {
    const month = ventilatorDay.slice(0, 7)
    const counts = months.get(month) ?? { ...NOTHING }
    months.set(month, counts)
    counts.started += 1
    counts[outcome ?? 'running'] += 1
  }
  return { of: (month: string): TrialCounts => months.get(month) ?? { ...NOTHING } }
}
