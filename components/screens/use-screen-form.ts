'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useMemo, useState } from 'react'
import { useForm, useWatch } from 'react-hook-form'
import type { z } from 'zod'
import { recordScreenSchema, type ScreenFormDto } from '@/lib/schemas/screens'
import { wallClock } from '@/lib/client/wall-clock'
import type { ScreenReadings } from '@/lib/weaning/readings'
import { judgeScreen } from '@/lib/weaning/screen/judge-screen'
import { readingsOf, RSBI_READINGS } from './criterion-inputs'
import { carryOver, confirmedReadings, NO_READINGS, type Carried } from './screen-values'

export type ScreenFormInput = z.input<typeof recordScreenSchema>

const parse = zodResolver(recordScreenSchema)

/** The state of a screen being filled in: the form, what is carried over and not confirmed, and the verdict as it stands. */
export function useScreenForm(dto: ScreenFormDto) {
  const [start] = useState(() => startFrom(dto))
  const [carried, setCarried] = useState<Carried>(start.carried)
  const [isExcusing, setExcusing] = useState(start.values.excuse !== null)
  // What is checked and sent is what counts: values not confirmed are left out, and an excuse goes without readings.
  const resolver: typeof parse = async (values, context, options) => {
    if (isExcusing && values.excuse === null) {
      return { values: {}, errors: { excuse: { type: 'required', message: 'Choose why there is no screen today.' } } }
    }
    const readings = isExcusing ? null : confirmedReadings(values.readings ?? NO_READINGS, carried, 'keep unreadable')
    return parse({ ...values, excuse: isExcusing ? values.excuse : null, readings }, context, options)
  }
  const form = useForm({ shouldFocusError: false, resolver, defaultValues: start.values })
  const typed = useWatch({ control: form.control, name: 'readings' })
  const counted = useMemo(() => confirmedReadings(typed ?? NO_READINGS, carried), [typed, carried])
  const verdict = judgeScreen(dto.protocol.content.screen, counted, dto.patient.isAdult)

  const shown = new Set<keyof ScreenReadings>([
    ...RSBI_READINGS,
    ...dto.protocol.content.screen.flatMap(({ criterion }) => readingsOf(criterion)),
  ])
  const unconfirmed = Object.keys(carried).filter((name): name is keyof Carried => shown.has(name as keyof ScreenReadings))
  const confirm = (names: readonly string[]) =>
    setCarried((now) => Object.fromEntries(Object.entries(now).filter(([name]) => !names.includes(name))) as Carried)

  return { form, verdict, counted, carried, unconfirmed, confirm, isExcusing, setExcusing }
}

function startFrom(dto: ScreenFormDto): { values: ScreenFormInput; carried: Carried } {
  const { amending } = dto
  const shared = { episodeId: dto.patient.episodeId, seenLatestId: dto.seenLatestId, recordAnyway: false, confirmedUnlikely: [] }
  if (amending) {
    const observed = wallClock(amending.observedAt, dto.patient.timeZone)
    const values = {
      ...shared,
      observed,
      amends: { id: amending.id, reason: '' },
      excuse: amending.excuse,
      note: amending.note,
      readings: amending.readings ?? NO_READINGS,
      confirmedUnlikely: amending.unlikely,
    }
    return { values, carried: {} }
  }
  const [latest] = dto.screens
  const left =
    latest?.result === 'incomplete' && latest.readings ? { observedAt: latest.observedAt, readings: latest.readings } : null
  const { readings, carried } = carryOver(dto.prefill, left, dto.nowMs)
  return { values: { ...shared, observed: dto.wallClock, amends: null, excuse: null, note: null, readings }, carried }
}
