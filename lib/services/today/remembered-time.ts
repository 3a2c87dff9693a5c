import { localDay, wallClockMs } from '@/lib/shared/time'

const LONGEST_MEMO = 5_000

/** Remembers the answers of a pure function of a zone and something else; starts over when full. */
function remember<Input extends string, Answer>(compute: (input: Input) => Answer): (input: Input) => Answer {
  const known = new Map<Input, Answer>()
  return (input) => {
    const earlier = known.get(input)
    if (earlier !== undefined) return earlier
    if (known.size >= LONGEST_MEMO) known.clear()
    const answer = compute(input)
    known.set(input, answer)
    return answer
  }
}

const days = remember((key: string) => {
  const [ms = '', timeZone = ''] = key.split(' ')
  return localDay(Number(ms), timeZone)
})
const moments = remember((key: string) => {
  const [day = '', minutes = '', timeZone = ''] = key.split(' ')
  return wallClockMs(day, Number(minutes), timeZone)
})

/** localDay, remembered: Today asks about the same moments every few seconds, and time-zone arithmetic is most of its own work. */
export function rememberedDay(ms: number, timeZone: string): string {
  return days(`${ms} ${timeZone}`)
}

/** wallClockMs, remembered. */
export function rememberedMoment(day: string, minutesAfterMidnight: number, timeZone: string): number {
  return moments(`${day} ${minutesAfterMidnight} ${timeZone}`)
}
