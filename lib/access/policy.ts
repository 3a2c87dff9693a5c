import type { ClinicalRole } from '@/lib/weaning/vocabulary'

/**
 * Who may do what: the whole of it. `roles` are held in the unit concerned. `clinician` in a comment means rt, nurse, physician, unit_lead.
 * scope says what is asked for: a unit (or a thing in it), the hospital's administration, or only a signed-in person.
 */
type Rule = { scope: 'unit'; roles: readonly ClinicalRole[] } | { scope: 'hospital' } | { scope: 'signed_in' }

const CLINICIANS = ['rt', 'nurse', 'physician', 'unit_lead'] as const
const BEDSIDE = ['rt', 'nurse', 'physician'] as const

export const POLICY = {
  'today.read': { scope: 'unit', roles: CLINICIANS },
  'patient.read': { scope: 'unit', roles: CLINICIANS },
  'patient.list': { scope: 'unit', roles: CLINICIANS },
  'patient.admit': { scope: 'unit', roles: BEDSIDE },
  'patient.correct': { scope: 'unit', roles: BEDSIDE },
  'stay.move': { scope: 'unit', roles: BEDSIDE },
  'stay.end': { scope: 'unit', roles: BEDSIDE },
  'episode.begin': { scope: 'unit', roles: BEDSIDE },
  'episode.end': { scope: 'unit', roles: BEDSIDE },
  'airway.record': { scope: 'unit', roles: BEDSIDE },
  'settings.record': { scope: 'unit', roles: BEDSIDE },
  'gas.record': { scope: 'unit', roles: BEDSIDE },
  'screen.record': { scope: 'unit', roles: ['rt', 'physician'] },
  'hold.start': { scope: 'unit', roles: ['nurse', 'physician'] },
  'hold.observe': { scope: 'unit', roles: BEDSIDE },
  'hold.end': { scope: 'unit', roles: ['nurse', 'physician'] },
  'trial.start': { scope: 'unit', roles: ['rt', 'physician'] },
  'trial.observe': { scope: 'unit', roles: BEDSIDE },
  'trial.end': { scope: 'unit', roles: ['rt', 'physician'] },
  'decision.sign': { scope: 'unit', roles: ['physician'] },
  'protocol.read': { scope: 'unit', roles: CLINICIANS },
  'protocol.draft': { scope: 'unit', roles: ['unit_lead'] },
  'protocol.approve': { scope: 'unit', roles: ['physician'] },
  'mail.read': { scope: 'unit', roles: CLINICIANS },
  'mail.schedule': { scope: 'unit', roles: ['unit_lead'] },
  'review.read': { scope: 'unit', roles: CLINICIANS },
  'review.export': { scope: 'unit', roles: ['unit_lead', 'physician'] },
  'opening.list': { scope: 'unit', roles: ['unit_lead'] },
  'opening.open': { scope: 'signed_in' },
  'session.read': { scope: 'signed_in' },
  'session.lock': { scope: 'signed_in' },
  'session.end_all': { scope: 'signed_in' },
  'password.change': { scope: 'signed_in' },
  'people.manage': { scope: 'hospital' },
  'units.manage': { scope: 'hospital' },
  'hospital.manage': { scope: 'hospital' },
} as const satisfies Record<string, Rule>

export type Action = keyof typeof POLICY
export type Membership = { unitId: string; role: ClinicalRole }

/** Whether these memberships allow the action in the unit. Unknown action or unit is refused. Browser-safe: for showing or hiding, the door decides. */
export function mayInUnit(memberships: readonly Membership[], action: Action, unitId: string): boolean {
  const rule: Rule | undefined = POLICY[action]
  if (rule?.scope !== 'unit') return false
  return memberships.some((held) => held.unitId === unitId && rule.roles.includes(held.role))
}

/** Actions that a record opening (a stated reason, limited time) allows to a clinician of another unit. */
export const ALLOWED_BY_OPENING: readonly Action[] = ['patient.read']

/** The action that the form of each owed step asks for. */
export const STEP_ACTIONS = {
  screen: 'screen.record',
  complete_screen: 'screen.record',
  hold: 'hold.start',
  observe_hold: 'hold.observe',
  end_hold: 'hold.end',
  start_trial: 'trial.start',
  observe_trial: 'trial.observe',
  end_trial: 'trial.end',
  decide: 'decision.sign',
  decide_again: 'decision.sign',
  extubate: 'episode.end',
} as const satisfies Record<string, Action>
