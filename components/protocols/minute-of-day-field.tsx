'use client'

import { useState } from 'react'
import type { FieldValues } from 'react-hook-form'
import { CONTROL_LOOK, FieldFrame, type FieldProps } from '@/components/forms/field-frame'
import { tidyTime } from '@/components/forms/tidy-time'
import { describedBy, useField } from '@/components/forms/use-field'
import { cn } from '@/lib/shared/cn'
import { formatMinutes } from '@/lib/shared/format'

/** A wall-clock time that the form holds as minutes after midnight; NaN while it cannot be read. */
export function MinuteOfDayField<Values extends FieldValues, Context, Output>(props: FieldProps<Values, Context, Output>) {
  const { control, name, label, hint, beside, className } = props
  const { ids, path, value, error: problem, register, change, blur } = useField({ control, name })
  const [typed, setTyped] = useState(() => (typeof value === 'number' ? formatMinutes(value) : ''))
  const error = problem && Number.isNaN(value) ? 'Give the time on the 24-hour clock, such as 05:00.' : problem
  return (
    <FieldFrame ids={ids} label={label} hint={hint} error={error} beside={beside} className={className}>
      <input
        id={ids.control}
        name={path}
        ref={register}
        value={typed}
        inputMode="numeric"
        autoComplete="off"
        maxLength={5}
        placeholder="HH:MM"
        aria-invalid={error ? true : undefined}
        aria-describedby={describedBy(ids, hint, error)}
        className={cn(CONTROL_LOOK, 'figure box-content w-[6.5ch] text-xl font-semibold')}
        onChange={(event) => {
          setTyped(event.target.value)
          change(toMinutes(tidyTime(event.target.value)))
        }}
        onBlur={() => {
          setTyped(tidyTime(typed))
          blur()
        }}
      />
    </FieldFrame>
  )
}

function toMinutes(time: string): number {
  const found = /^([01]\d|2[0-3]):([0-5]\d)$/.exec(time)
  return found ? Number(found[1]) * 60 + Number(found[2]) : NaN
}
