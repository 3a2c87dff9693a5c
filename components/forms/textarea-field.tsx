'use client'

import type { FieldValues } from 'react-hook-form'
import { cn } from '@/lib/shared/cn'
import { CONTROL_LOOK, FieldFrame, type FieldProps } from './field-frame'
import { describedBy, shownText, useField } from './use-field'

/** Several lines of text. Enter makes a new line here. */
export function TextareaField<Values extends FieldValues, Context, Output>(
  props: FieldProps<Values, Context, Output> & { rows?: number; maxLength?: number },
) {
  const { control, name, label, hint, beside, isLabelHidden, className, rows = 3, maxLength } = props
  const { ids, path, value, error, register, change, blur } = useField({ control, name })
  return (
    <FieldFrame
      ids={ids}
      label={label}
      hint={hint}
      error={error}
      beside={beside}
      isLabelHidden={isLabelHidden}
      className={className}
    >
      <textarea
        id={ids.control}
        name={path}
        ref={register}
        value={shownText(value)}
        rows={rows}
        maxLength={maxLength}
        aria-invalid={error ? true : undefined}
        aria-describedby={describedBy(ids, hint, error)}
        className={cn(CONTROL_LOOK, 'w-full max-w-reading py-2.5')}
        onChange={change}
        onBlur={blur}
      />
    </FieldFrame>
  )
}
