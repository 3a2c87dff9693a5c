/**
 * The infusions that a sedation hold stops: sedatives, and analgesics given for sedation. Analgesia for active pain stays on.
 * Source: awakening trial of Girard 2008, doi:10.1016/S0140-6736(08)60105-1 (from a later reuse of that protocol).
 * @example infusionsToHold([{ drug: 'fentanyl', purpose: 'pain' }, { drug: 'midazolam', purpose: 'sedation' }]) // [midazolam]
 */
export function infusionsToHold<T extends { purpose: 'sedation' | 'pain' }>(infusions: readonly T[]): T[] {
  return infusions.filter(({ purpose }) => purpose === 'sedation')
}
