'use client'

import { useState } from 'react'
import { useFormState, type FieldValues } from 'react-hook-form'
import { CONTROL_LOOK, FieldFrame, type FieldProps } from '@/components/forms/field-frame'
import { parseNumber } from '@/components/forms/parse-number'
import { describedBy, useField } from '@/components/forms/use-field'
import { cn } from '@/lib/shared/cn'

/** A row of numbers, written with spaces or commas between them; the form holds an array. */
export function NumberListField<Values extends FieldValues, Context, Output>(props: FieldProps<Values, Context, Output>) {
  const { control, name, label, hint, className } = props
  const { ids, path, value, register, change, blur } = useField({ control, name })
  const { errors } = useFormState({ control, name })
  const [typed, setTyped] = useState(() => (Array.isArray(value) ? value.join(', ') : ''))
  const error = firstMessage(
    name
      .split('.')
      .reduce<unknown>(
        (at, step) => (typeof at === 'object' && at !== null ? (at as Record<string, unknown>)[step] : undefined),
        errors,
      ),
  )
  return (
    <FieldFrame ids={ids} label={label} hint={hint} error={error} className={className}>
      <input
        id={ids.control}
        name={path}
        ref={register}
        value={typed}
        autoComplete="off"
        aria-invalid={error ? true : undefined}
        aria-describedby={describedBy(ids, hint, error)}
        className={cn(CONTROL_LOOK, 'figure w-[40ch] max-w-full')}
        onChange={(event) => {
          setTyped(event.target.value)
          change(
            event.target.value
              .split(/[\s,;]+/)
              .filter((part) => part !== '')
              .map((part) => parseNumber(part).value ?? NaN),
          )
        }}
        onBlur={blur}
      />
    </FieldFrame>
  )
}

/** The message of the list itself, or of its first wrong number. */
function firstMessage(error: unknown): string | undefined {
  if (typeof error !== 'object' || error === null) return undefined
  if ('message' in error && typeof error.message === 'string' && error.message !== '') return error.message
  return Object.values(error)
    .map(firstMessage)
    .find((message) => message !== undefined)
}
