import type { ObservedInput } from '@/lib/schemas/observed'
import { invalidField } from '@/lib/shared/errors'
import { formatTime } from '@/lib/shared/format'
import { HOUR_MS } from '@/lib/shared/time'
import { resolveObserved } from '../entries/resolve-observed'

const LONGEST_MS = 7 * 24 * HOUR_MS

/** The moment (UTC ms) at which to look again: in the future by the unit's clock, and within 7 days. Refuses at the field. */
export function resolveLookAgain(lookAgain: ObservedInput, timeZone: string, now: number): number {
  const at = resolveObserved(lookAgain, timeZone, Number.POSITIVE_INFINITY, 'lookAgain')
  if (at <= now)
    throw invalidField('lookAgain.time', `This time is past. It is ${formatTime(now, timeZone, now)} now; give a later time.`)
  if (at - now > LONGEST_MS) throw invalidField('lookAgain.day', 'This is more than 7 days away. Give an earlier day.')
  return at
}
