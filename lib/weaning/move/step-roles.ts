import type { MoveStep } from '@/lib/weaning/day-record'
import type { ClinicalRole } from '@/lib/weaning/vocabulary'

/** Whose move each step is. */
export const STEP_ROLES: Record<MoveStep, ClinicalRole> = {
  screen: 'rt',
  complete_screen: 'rt',
  hold: 'nurse',
  observe_hold: 'nurse',
  end_hold: 'nurse',
  start_trial: 'rt',
  observe_trial: 'rt',
  end_trial: 'rt',
  decide: 'physician',
  decide_again: 'physician',
  extubate: 'rt',
}
