'use client'

import type { FieldValues } from 'react-hook-form'
import { cn } from '@/lib/shared/cn'
import { CONTROL_LOOK, FieldFrame, type FieldProps } from './field-frame'
import { describedBy, shownText, useField } from './use-field'

const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec']

/** "1 Dec 2026" for yyyy-mm-dd; empty for anything else. */
export function spelledDay(day: unknown): string {
  const parts = typeof day === 'string' ? /^(\d{4})-(\d{2})-(\d{2})$/.exec(day) : null
  if (!parts) return ''
  return `${Number(parts[3])} ${MONTHS[Number(parts[2]) - 1] ?? ''} ${parts[1]}`
}

/** A calendar day. The browser shows it in its own order of day and month, so it is spelled out beside the field. */
export function DateField<Values extends FieldValues, Context, Output>(
  props: FieldProps<Values, Context, Output> & { min?: string; max?: string },
) {
  const { control, name, label, hint, beside, isLabelHidden, className, min, max } = props
  const { ids, path, value, error, register, change, blur } = useField({ control, name })
  return (
    <FieldFrame
      ids={ids}
      label={label}
      hint={hint}
      error={error}
      isLabelHidden={isLabelHidden}
      className={className}
      beside={
        <>
          <output htmlFor={ids.control} className="text-muted">
            {spelledDay(value)}
          </output>
          {beside}
        </>
      }
    >
      <input
        id={ids.control}
        type="date"
        name={path}
        ref={register}
        value={shownText(value)}
        min={min}
        max={max}
        aria-invalid={error ? true : undefined}
        aria-describedby={describedBy(ids, hint, error)}
        className={cn(CONTROL_LOOK, 'figure max-w-full')}
        onChange={(event) => change(event.target.value === '' ? null : event.target.value)}
        onBlur={blur}
      />
    </FieldFrame>
  )
}
