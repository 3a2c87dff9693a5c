import { notAnswered } from '@/components/episodes/not-answered'
import { INFUSION_UNITS, type InfusionDto } from '@/lib/schemas/holds'
import type { HoldStartInput } from './use-hold-start'

export type InfusionInput = HoldStartInput['infusions'][number]

/** A new line: rate, unit and purpose are left for the nurse, since a preset one would be taken over unread. */
export function blankInfusion(): InfusionInput {
  return { drug: '', rate: notAnswered(), unit: notAnswered(), purpose: notAnswered() }
}

/** An infusion on record as the form holds it. */
export function toInfusionInput(infusion: InfusionDto): InfusionInput {
  return { ...infusion, unit: INFUSION_UNITS.find((unit) => unit === infusion.unit) ?? notAnswered() }
}

/** The same without its rate: the restart rate is computed from it, so it is read off the pump again. */
export function withoutRate(infusion: InfusionDto): InfusionInput {
  return { ...toInfusionInput(infusion), rate: notAnswered() }
}
