'use client'

import { useState, type ReactNode } from 'react'
import type { FieldValues } from 'react-hook-form'
import { cn } from '@/lib/shared/cn'
import { CONTROL_LOOK, FieldFrame, type FieldProps } from './field-frame'
import { describedBy, useField } from './use-field'
import { numberText, parseNumber } from './parse-number'

type NumberFieldProps<Values extends FieldValues, Context, Output> = FieldProps<Values, Context, Output> & {
  unit?: ReactNode
  /** Width in characters of the number. */
  digits?: number
  /** Values below zero can be typed; the keypad of some phones has no minus. */
  isSigned?: boolean
  /** Whole numbers get the plainer keypad. */
  isWhole?: boolean
  onTyped?: () => void
}

/** A number with its unit inside the field. The form holds number or null (NaN while unreadable); the field keeps what was typed. */
export function NumberField<Values extends FieldValues, Context, Output>(props: NumberFieldProps<Values, Context, Output>) {
  const { control, name, label, hint, beside, isLabelHidden, className, unit, digits = 5, isSigned, isWhole, onTyped } = props
  const { ids, path, value, error: refusal, register, change, blur } = useField({ control, name })
  const [typed, setTyped] = useState(() => numberText(value))
  const parsed = parseNumber(typed)
  // A value set from outside (reset, carried over) wins over the text that was typed before it.
  const text = Object.is(parsed.value, value) ? typed : numberText(value)
  const problem = text === typed ? parsed.problem : null
  const error = refusal && problem ? problem : refusal

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
      <span
        className={cn(
          'focus-within-ring inline-flex cursor-text items-baseline gap-2 py-1',
          CONTROL_LOOK,
          error && 'border-2 border-stop',
        )}
        onClick={(event) => event.currentTarget.querySelector('input')?.focus()}
      >
        <input
          id={ids.control}
          name={path}
          ref={register}
          value={text}
          inputMode={isSigned ? 'text' : isWhole ? 'numeric' : 'decimal'}
          autoComplete="off"
          enterKeyHint="next"
          aria-invalid={error ? true : undefined}
          aria-describedby={
            [unit ? `${ids.control}unit` : null, describedBy(ids, hint, error)].filter(Boolean).join(' ') || undefined
          }
          style={{ width: `calc(${digits}ch + 4px)` }}
          className="figure min-h-[34px] bg-transparent text-xl font-semibold outline-none"
          onChange={(event) => {
            setTyped(event.target.value)
            change(parseNumber(event.target.value).value)
            onTyped?.()
          }}
          onBlur={blur}
        />
        {unit ? (
          <span id={`${ids.control}unit`} className="text-sm whitespace-nowrap text-muted">
            {unit}
          </span>
        ) : null}
      </span>
    </FieldFrame>
  )
}
