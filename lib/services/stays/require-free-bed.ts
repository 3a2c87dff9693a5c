import 'server-only'
import type { Tx } from '@/db/client'
import { findBedInUse, findOccupationSince } from '@/db/queries/stays'
import { invalidField } from '@/lib/shared/errors'
import { formatTime } from '@/lib/shared/format'

type Wanted = { bedId: string; unit: { id: string; timeZone: string }; at: number; now: number }

/**
 * The bed, if it is one of the unit's and nobody lies in it from that moment (UTC ms) on. Refuses at the field `bedId`, and never says who
 * lies there.
 */
export function requireFreeBed(tx: Tx, { bedId, unit, at, now }: Wanted) {
  const bed = findBedInUse(tx, bedId, unit.id)
  if (!bed) throw invalidField('bedId', 'This bed is not in use in this unit. Choose another bed.')
  const occupation = findOccupationSince(tx, bed.id, at)
  if (!occupation) return bed
  if (occupation.endedAt === null) throw invalidField('bedId', `Bed ${bed.label} is taken. Choose a free bed.`)
  throw invalidField(
    'bedId',
    `Bed ${bed.label} was taken until ${formatTime(occupation.endedAt, unit.timeZone, now)}. Choose another bed, or give a later time.`,
  )
}
