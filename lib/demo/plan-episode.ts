import { HOUR_MS } from '@/lib/shared/time'
import type { EpisodeEnd, EpisodeStart } from '@/lib/weaning/vocabulary'
import { planLiberation } from './plan-day'
import type { DayScript } from './script'
import type { World } from './world'

/** One run of ventilation as it will go: when, why it ends, and the day on which the tube comes out as planned. */
export type EpisodePlan = {
  startMs: number
  start: EpisodeStart
  endMs: number | null
  end: EpisodeEnd | null
  lastDay: DayScript | null
  isComfort: boolean
  tracheostomyMs: number | null
}

/** Plans a run of ventilation. Its length is by chance around the median of days; its end too. */
export function planEpisode(world: World, startMs: number, start: EpisodeStart, medianDays: number): EpisodePlan {
  const { random, calendar } = world
  const days = Math.max(1, Math.min(32, Math.round(medianDays * Math.exp(random.normal(0, 0.72)))))
  const lastIndex = calendar.indexOf(startMs) + days
  const fate = random.next()
  const base = { startMs, start, lastDay: null, isComfort: false, tracheostomyMs: null }
  const someTime = () => calendar.at(lastIndex, random.whole(20, 1420))
  if (random.chance(1 - 0.989 ** days))
    return { ...base, endMs: someTime(), end: random.chance(0.8) ? 'self_extubated' : 'accidentally_extubated' }
  if (fate < 0.11) return { ...base, endMs: someTime(), end: 'died' }
  if (fate < 0.15) return planComfort(world, base, lastIndex)
  if (fate < 0.17) return { ...base, endMs: calendar.at(lastIndex, random.whole(600, 1000)), end: 'left_hospital' }
  if (days >= 9 && random.chance(0.4)) {
    const tracheostomyMs = calendar.at(calendar.indexOf(startMs) + random.whole(7, days - 1), random.whole(600, 900))
    return { ...base, endMs: calendar.at(lastIndex + 2, random.whole(540, 1100)), end: 'ventilator_off', tracheostomyMs }
  }
  const { script, extubatedMs } = planLiberation(world, lastIndex)
  return { ...base, endMs: extubatedMs, end: 'extubated', lastDay: script }
}

function planComfort(
  world: World,
  base: Pick<EpisodePlan, 'startMs' | 'start' | 'tracheostomyMs'>,
  lastIndex: number,
): EpisodePlan {
  const { random, calendar } = world
  const atMs = calendar.at(lastIndex, random.whole(620, 960))
  const lastDay: DayScript = {
    screen: { atMs: calendar.at(lastIndex, random.whole(310, 500)), kind: 'excused', excuse: 'comfort_care', note: null },
    decision: {
      atMs,
      choice: 'comfort_extubation',
      reasons: [],
      lookAgainMs: null,
      supportAfter: 'oxygen',
      note: 'After talks with the family. Invented.',
    },
  }
  return { ...base, lastDay, isComfort: true, endMs: atMs + random.between(0.5, 2) * HOUR_MS, end: 'extubated' }
}
