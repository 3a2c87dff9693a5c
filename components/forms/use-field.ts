'use client'

import { useId, type ReactNode } from 'react'
import { useController, type Control, type FieldPath, type FieldValues } from 'react-hook-form'

/** Ids that wire label, hint and error to a control. */
export type FieldIds = { control: string; hint: string; error: string }

export function useFieldIds(): FieldIds {
  const base = useId()
  return { control: base, hint: `${base}hint`, error: `${base}error` }
}

/** The value of aria-describedby for what is really there. */
export function describedBy(ids: FieldIds, hint: ReactNode, error: string | undefined): string | undefined {
  return [error ? ids.error : null, hint ? ids.hint : null].filter(Boolean).join(' ') || undefined
}

export type Field = {
  ids: FieldIds
  path: string
  value: unknown
  error: string | undefined
  /** Goes to the element that takes focus when the field is wrong. */
  register: (element: HTMLElement | null) => void
  change: (value: unknown) => void
  blur: () => void
}

/** One field of a form: its value, its error, and the ways to change them. */
export function useField<Values extends FieldValues, Context, Output>(at: {
  control: Control<Values, Context, Output>
  name: FieldPath<Values>
}): Field {
  const { field, fieldState } = useController({ control: at.control, name: at.name })
  const { name: path, value, ref: register, onChange: change, onBlur: blur } = field
  return { ids: useFieldIds(), path, value: value ?? null, error: fieldState.error?.message, register, change, blur }
}

/** The text to show for a value of the form; empty for none. */
export function shownText(value: unknown): string {
  return typeof value === 'string' || typeof value === 'number' ? String(value) : ''
}
