'use client'

import { useEffect } from 'react'
import type { FieldPath, FieldPathValue, FieldValues, UseFormReturn } from 'react-hook-form'
import { wallClock } from '@/lib/client/wall-clock'
import { MINUTE_MS } from '@/lib/shared/time'

/**
 * Lets the time of a form that nobody has touched follow the unit's clock, so that a page left open does not record an old time.
 * The first key or tap in the form holds the minute. Off for a correction, which starts from the time recorded before.
 */
export function useObservedNow<Values extends FieldValues, Context, Output>(
  form: UseFormReturn<Values, Context, Output>,
  nowMs: number,
  timeZone: string,
  isOn: boolean,
): void {
  const { isDirty } = form.formState
  const minute = Math.floor(nowMs / MINUTE_MS)
  useEffect(() => {
    if (!isOn || isDirty) return
    const name = 'observed' as FieldPath<Values>
    form.resetField(name, { defaultValue: wallClock(minute * MINUTE_MS, timeZone) as FieldPathValue<Values, FieldPath<Values>> })
  }, [form, isDirty, isOn, minute, timeZone])
}
