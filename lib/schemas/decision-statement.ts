import type { DecisionChoice, NotTodayReason, SupportAfter } from '@/lib/weaning/vocabulary'
import { NOT_TODAY_WORDS, SUPPORT_WORDS } from '@/lib/weaning/words'

/** What a physician has chosen, with the time to look again already in words of the unit's clock ("3 Mar 14:00"). */
export type DecisionPlan = {
  choice: DecisionChoice
  reasons: readonly NotTodayReason[]
  lookAgainWords: string | null
  supportAfter: SupportAfter | null
  steroidsPlanned: boolean | null
  note: string | null
}

const CHOSEN: Record<DecisionChoice, string> = {
  extubate: 'to extubate this patient',
  not_today: 'not to extubate this patient today',
  tracheostomy_pathway: 'for the tracheostomy pathway',
  comfort_extubation: 'for comfort-focused extubation',
}

/** The sentence that is signed, before name and time: "I have decided not to extubate this patient today (reason: secretions), …". */
export function decisionWords(plan: DecisionPlan): string {
  const reasons = plan.reasons.map((reason) => NOT_TODAY_WORDS[reason])
  const parts = [`I have decided ${CHOSEN[plan.choice]}`]
  if (reasons.length > 0) parts[0] += ` (${reasons.length === 1 ? 'reason' : 'reasons'}: ${reasons.join(', ')})`
  if (plan.lookAgainWords !== null) parts.push(`to look again at ${plan.lookAgainWords}`)
  if (plan.supportAfter !== null) parts.push(`with ${SUPPORT_WORDS[plan.supportAfter]} planned afterwards`)
  if (plan.steroidsPlanned !== null) parts.push(plan.steroidsPlanned ? 'with steroids planned' : 'without steroids')
  const note = plan.note === null || plan.note === '' ? '' : ` Note: ${plan.note.replace(/[.\s]+$/, '')}.`
  return `${parts.join(', ')}.${note}`
}

/** The whole statement: what was decided, by whom in which role and unit, and when by the unit's clock. */
export function signedStatement(plan: DecisionPlan, signer: { name: string; unitName: string; timeWords: string }): string {
  return `${decisionWords(plan)} Signed by ${signer.name}, physician, ${signer.unitName}, at ${signer.timeWords}.`
}
