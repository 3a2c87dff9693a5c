const MINUTE_MS = 60_000
const LONGEST_EARLY_MIN = 2

/**
 * The next look that a trial owes: the first scheduled minute that no look has covered, or null when none is left.
 * A look covers every scheduled minute up to it, so that nobody owes minute 2 at minute 12, and the one after it when it comes no earlier
 * than a quarter of the interval before that minute, 2 min at most. The planned end always closes the schedule. Derived, no source.
 * @example nextObservation({ startedMs: 0, plannedDurationMin: 30, observationMinutes: [2, 5, 10, 15, 30], observedMs: [] }) // { minute: 2, dueMs: 120000 }
 */
export function nextObservation(input: {
  startedMs: number
  plannedDurationMin: number
  observationMinutes: readonly number[]
  observedMs: readonly number[]
}): { minute: number; dueMs: number } | null {
  const { startedMs, plannedDurationMin } = input
  const scheduled = input.observationMinutes.filter((minute) => minute > 0 && minute < plannedDurationMin)
  const minutes = [...new Set([...scheduled, plannedDurationMin])].sort((a, b) => a - b)
  const lastMs = Math.max(startedMs - 1, ...input.observedMs)
  let beforeMin = 0
  for (const minute of minutes) {
    const earlyMin = Math.min(LONGEST_EARLY_MIN, (minute - beforeMin) / 4)
    if (lastMs < startedMs + (minute - earlyMin) * MINUTE_MS) return { minute, dueMs: startedMs + minute * MINUTE_MS }
    beforeMin = minute
  }
  return null
}
