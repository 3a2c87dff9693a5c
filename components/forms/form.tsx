'use client'

import type { KeyboardEvent, ReactNode } from 'react'
import type { Submit } from './use-submit'

type FormProps = {
  submit: Pick<Submit, 'onSubmit'>
  /** Names the form for screen readers, when no heading does. */
  label?: string
  className?: string
  children: ReactNode
}

/**
 * A form whose Enter key moves on to the next field; in the last one it sends. The browser's own checks are off, ours speak.
 * Method post: sent before the page is live, what was typed must not end in an address.
 */
export function Form({ submit, label, className, children }: FormProps) {
  return (
    <form method="post" noValidate aria-label={label} className={className} onSubmit={submit.onSubmit} onKeyDown={moveOnEnter}>
      {children}
    </form>
  )
}

function moveOnEnter(event: KeyboardEvent<HTMLFormElement>): void {
  const from = event.target
  if (event.key !== 'Enter' || event.nativeEvent.isComposing || !(from instanceof HTMLInputElement)) return
  const stops = fieldStops(event.currentTarget)
  const next = stops[stops.findIndex((stop) => stop === from || isSameGroup(stop, from)) + 1]
  if (!next) return
  event.preventDefault()
  next.focus()
  if (next instanceof HTMLInputElement && next.type !== 'radio' && next.type !== 'checkbox') next.select()
}

/** Fields in the order of the page; a radio group is one stop, at its chosen button. */
function fieldStops(form: HTMLFormElement): (HTMLInputElement | HTMLSelectElement | HTMLTextAreaElement)[] {
  const all = form.querySelectorAll<HTMLInputElement | HTMLSelectElement | HTMLTextAreaElement>(
    'input:not([type=hidden]), select, textarea',
  )
  const stops: (HTMLInputElement | HTMLSelectElement | HTMLTextAreaElement)[] = []
  for (const field of all) {
    if (field.disabled || field.closest('[hidden], [inert]')) continue
    const earlier = stops.findIndex((stop) => field instanceof HTMLInputElement && isSameGroup(stop, field))
    if (earlier === -1) stops.push(field)
    else if (field instanceof HTMLInputElement && field.checked) stops[earlier] = field
  }
  return stops
}

function isSameGroup(stop: Element, field: HTMLInputElement): boolean {
  return field.type === 'radio' && stop instanceof HTMLInputElement && stop.type === 'radio' && stop.name === field.name
}
