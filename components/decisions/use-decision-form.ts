'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useForm } from 'react-hook-form'
import type { z } from 'zod'
import { notAnswered } from '@/components/episodes/not-answered'
import { wallClock } from '@/lib/client/wall-clock'
import { signDecisionSchema, type DecisionFormDto } from '@/lib/schemas/decisions'

export type DecisionInput = z.input<typeof signDecisionSchema>

const parse = zodResolver(signDecisionSchema)

/** A decision being filled in; nothing is chosen beforehand. What belongs to another choice is left out of what is checked and sent. */
export function useDecisionForm(dto: DecisionFormDto) {
  const resolver: typeof parse = async (values, context, options) => {
    const isNotToday = values.choice === 'not_today'
    const hasSupport = values.choice === 'extubate' || values.choice === 'comfort_extubation'
    const own = {
      ...values,
      reasons: isNotToday ? values.reasons : [],
      lookAgain: isNotToday ? values.lookAgain : null,
      supportAfter: hasSupport ? values.supportAfter : null,
      steroidsPlanned: hasSupport ? values.steroidsPlanned : null,
    }
    return parse(own, context, options)
  }
  return useForm({ shouldFocusError: false, resolver, defaultValues: startFrom(dto) })
}

function startFrom(dto: DecisionFormDto): DecisionInput {
  const shared = {
    episodeId: dto.patient.episodeId,
    seenLatestId: dto.seenLatestId,
    recordAnyway: false,
    seenEvidenceHash: dto.evidenceHash,
    password: '',
  }
  const { amending } = dto
  const today = { day: dto.wallClock.day, time: '' }
  if (!amending) {
    return {
      ...shared,
      amends: null,
      choice: notAnswered(),
      reasons: [],
      lookAgain: today,
      supportAfter: null,
      steroidsPlanned: null,
      note: null,
    }
  }
  const { choice, reasons, lookAgainAt, supportAfter, steroidsPlanned, note } = amending
  const lookAgain = lookAgainAt === null ? today : wallClock(lookAgainAt, dto.patient.timeZone)
  return { ...shared, amends: { id: amending.id, reason: '' }, choice, reasons, lookAgain, supportAfter, steroidsPlanned, note }
}
