'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useState } from 'react'
import { useForm, type FieldErrors } from 'react-hook-form'
import type { z } from 'zod'
import { toInfusionInput } from './infusion-input'
import { notAnswered } from '@/components/episodes/not-answered'
import { wallClock } from '@/lib/client/wall-clock'
import { startHoldSchema, type HoldFormDto } from '@/lib/schemas/holds'
import { judgeSafety } from '@/lib/weaning/hold/judge-safety'
import type { HoldSafetyItem } from '@/lib/weaning/vocabulary'

export type HoldStartInput = z.input<typeof startHoldSchema>
type Answers = Partial<Record<HoldSafetyItem, boolean | null>>

const parse = zodResolver(startHoldSchema)

/**
 * The start of a hold being filled in. `start` holds only whether continuous sedation runs ("not_needed" or "started"); whether it is
 * recorded as started or as unsafe follows from the safety answers, and the button says which before it is pressed.
 */
export function useHoldStart(dto: HoldFormDto) {
  const [values] = useState(() => startFrom(dto))
  const items = dto.protocol.content.hold.safetyItems
  const resolver: typeof parse = async (typed, context, options) => {
    const answers: Answers = typed.safety ?? {}
    const result = judgeSafety(items, answers).result
    if (typed.start === 'started' && result === 'incomplete') return { values: {}, errors: unanswered(items, answers) }
    if (typed.start === 'not_needed') return parse({ ...typed, safety: null, infusions: [] }, context, options)
    const safety = Object.fromEntries(
      items.filter((item) => typeof answers[item] === 'boolean').map((item) => [item, answers[item]]),
    )
    const start = typed.start === 'started' && result === 'unsafe' ? 'unsafe' : typed.start
    return parse({ ...typed, start, safety: safety as HoldStartInput['safety'] }, context, options)
  }
  return useForm({ shouldFocusError: false, resolver, defaultValues: values })
}

function unanswered(items: readonly HoldSafetyItem[], answers: Answers): FieldErrors<HoldStartInput> {
  const open = items.filter((item) => typeof answers[item] !== 'boolean')
  const error = { type: 'required', message: 'Answer yes or no: what is not assessed does not count as absent.' }
  return { safety: Object.fromEntries(open.map((item) => [item, error])) } as FieldErrors<HoldStartInput>
}

function startFrom(dto: HoldFormDto): HoldStartInput {
  const shared = { episodeId: dto.patient.episodeId, seenLatestId: dto.seenLatestId, recordAnyway: false }
  if (dto.amending?.kind === 'start') {
    const { hold } = dto.amending
    return {
      ...shared,
      observed: wallClock(hold.observedAt, dto.patient.timeZone),
      amends: { id: hold.id, reason: '' },
      start: hold.start === 'not_needed' ? 'not_needed' : 'started',
      safety: hold.safety ?? {},
      infusions: hold.infusions.map(toInfusionInput),
      note: hold.note,
    }
  }
  return { ...shared, observed: dto.wallClock, amends: null, start: notAnswered(), safety: {}, infusions: [], note: null }
}
