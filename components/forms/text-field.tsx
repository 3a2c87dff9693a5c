'use client'

import type { HTMLInputAutoCompleteAttribute } from 'react'
import type { FieldValues } from 'react-hook-form'
import { cn } from '@/lib/shared/cn'
import { CONTROL_LOOK, FieldFrame, type FieldProps } from './field-frame'
import { describedBy, shownText, useField } from './use-field'

type TextFieldProps<Values extends FieldValues, Context, Output> = FieldProps<Values, Context, Output> & {
  type?: 'text' | 'email' | 'search' | 'date'
  autoComplete?: HTMLInputAutoCompleteAttribute
  inputMode?: 'text' | 'numeric' | 'email'
  maxLength?: number
  /** Width in characters; the field never grows wider than its place. */
  width?: number
}

/** One line of text. */
export function TextField<Values extends FieldValues, Context, Output>(props: TextFieldProps<Values, Context, Output>) {
  const {
    control,
    name,
    label,
    hint,
    beside,
    isLabelHidden,
    className,
    type = 'text',
    autoComplete = 'off',
    inputMode,
    maxLength,
    width = 28,
  } = props
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
      <input
        id={ids.control}
        type={type}
        name={path}
        ref={register}
        value={shownText(value)}
        autoComplete={autoComplete}
        inputMode={inputMode}
        maxLength={maxLength}
        aria-invalid={error ? true : undefined}
        aria-describedby={describedBy(ids, hint, error)}
        style={{ width: `${width}ch` }}
        className={cn(CONTROL_LOOK, 'max-w-full')}
        onChange={change}
        onBlur={blur}
      />
    </FieldFrame>
  )
}
