'use client'

import { useMutation, useQueryClient, type QueryKey } from '@tanstack/react-query'
import { useRef, useState, type FormEvent } from 'react'
import type { FieldPath, FieldValues, UseFormReturn } from 'react-hook-form'
import { ApiError, apiPost, failureMessage } from '@/lib/client/api'
import type { ErrorDto } from '@/lib/shared/errors'
import { newId } from '@/lib/shared/ids'

type SubmitOptions<Values extends FieldValues, Context, Output, Answer> = {
  form: UseFormReturn<Values, Context, Output>
  path: string | ((values: Output) => string)
  /** What is sent; the form's parsed values when left out. */
  toBody?: (values: Output) => unknown
  onRecorded: (answer: Answer) => void
  /** Lists that show what was changed; they are read anew. */
  invalidates?: readonly QueryKey[]
}

export type Submit = {
  onSubmit: (event: FormEvent<HTMLFormElement>) => void
  isSending: boolean
  /** Why the last sending failed, in words; null when it has not. */
  failure: { message: string; code: ErrorDto['code'] | 'NO_ANSWER' } | null
}

/** A tap that comes this soon after the answer and would send the very same again is the second half of a double tap. */
const ECHO_MS = 5_000

/**
 * Sends a form through the API. One idempotency key belongs to one filling of the form, so that a second tap or a repeat after a
 * lost answer is recorded once. On any failure everything typed stays, and the words of the server stand at their fields.
 */
export function useSubmit<Values extends FieldValues, Context, Output, Answer = unknown>(
  options: SubmitOptions<Values, Context, Output, Answer>,
): Submit {
  const { form, path, toBody, onRecorded, invalidates = [] } = options
  const queries = useQueryClient()
  const key = useRef<string | null>(null)
  const isBusy = useRef(false)
  const recorded = useRef<{ values: string; atMs: number } | null>(null)
  const [failure, setFailure] = useState<Submit['failure']>(null)
  const sending = useMutation({
    mutationFn: (values: Output) => {
      key.current ??= newId()
      const target = typeof path === 'function' ? path(values) : path
      return apiPost<Answer>(target, toBody ? toBody(values) : values, { idempotencyKey: key.current })
    },
  })

  const send = async (values: Output, element: HTMLFormElement) => {
    const asText = JSON.stringify(values)
    if (recorded.current?.values === asText && Date.now() - recorded.current.atMs < ECHO_MS) return
    setFailure(null)
    try {
      const answer = await sending.mutateAsync(values)
      key.current = null
      recorded.current = { values: asText, atMs: Date.now() }
      await Promise.all(invalidates.map((queryKey) => queries.invalidateQueries({ queryKey })))
      onRecorded(answer)
    } catch (error) {
      const dto = error instanceof ApiError ? error.dto : null
      setFailure({ message: failureMessage(error), code: dto?.code ?? 'NO_ANSWER' })
      for (const [name, message] of Object.entries(dto?.fields ?? {})) {
        form.setError(name as FieldPath<Values>, { type: 'server', message })
      }
      focusFirstInvalid(element)
    }
  }

  const onSubmit = (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault()
    if (isBusy.current) return
    isBusy.current = true
    const element = event.currentTarget
    let isRefused = false
    const sent = form.handleSubmit(
      (values) => send(values, element),
      () => {
        isRefused = true
      },
    )(event)
    // The messages are drawn only after the form has been judged, and its own choice of focus follows the order of mounting, not of the page.
    void sent.finally(() => {
      isBusy.current = false
      if (isRefused) focusFirstInvalid(element)
    })
  }

  return { onSubmit, isSending: sending.isPending, failure }
}

/** Moves focus to the first control marked as wrong, once it has been drawn so. */
export function focusFirstInvalid(element: HTMLElement): void {
  setTimeout(() => {
    const wrong = element.querySelector<HTMLElement>('[aria-invalid="true"], [data-invalid]')
    if (!wrong) return
    const target = wrong.matches('fieldset, [role=radiogroup]')
      ? (wrong.querySelector<HTMLElement>('input:checked') ?? wrong.querySelector<HTMLElement>('input'))
      : wrong
    target?.focus()
  }, 0)
}
