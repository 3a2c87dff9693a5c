'use client'

import type { FieldValues } from 'react-hook-form'
import { cn } from '@/lib/shared/cn'
import { CONTROL_LOOK, FieldFrame, type FieldProps } from './field-frame'
import { describedBy, shownText, useField } from './use-field'

export type SelectOption = { value: string; label: string }

type SelectFieldProps<Values extends FieldValues, Context, Output> = FieldProps<Values, Context, Output> & {
  options: readonly SelectOption[]
  /** Shown while nothing is chosen; the form then holds null. */
  prompt?: string
}

/** The browser's own list, for more choices than fit side by side. */
export function SelectField<Values extends FieldValues, Context, Output>(props: SelectFieldProps<Values, Context, Output>) {
  const { control, name, label, hint, beside, isLabelHidden, className, options, prompt = 'Choose' } = props
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
      <select
        id={ids.control}
        name={path}
        ref={register}
        value={shownText(value)}
        aria-invalid={error ? true : undefined}
        aria-describedby={describedBy(ids, hint, error)}
        className={cn(CONTROL_LOOK, 'max-w-full pr-8')}
        onChange={(event) => change(event.target.value === '' ? null : event.target.value)}
        onBlur={blur}
      >
        <option value="">{prompt}</option>
        {options.map((option) => (
          <option key={option.value} value={option.value}>
            {option.label}
          </option>
        ))}
      </select>
    </FieldFrame>
  )
}
