import type { RestartDto } from '@/lib/schemas/holds'
import { infusionsToHold } from '@/lib/weaning/hold/infusions-to-hold'
import { restartDose } from '@/lib/weaning/hold/restart-dose'

/** The rate that each held infusion comes to after a hold that was not tolerated. Analgesia for pain was left running and is not listed. */
export function computeRestarts(
  infusions: readonly { drug: string; rate: number; unit: string; purpose: 'sedation' | 'pain' }[],
  restartFraction: number,
): RestartDto[] {
  return infusionsToHold(infusions).flatMap(({ drug, unit, rate }) => {
    const dose = restartDose({ rateBefore: rate, restartFraction })
    return dose.known ? [{ drug, unit, rateBefore: rate, rate: dose.value }] : []
  })
}
