'use client'

import { useId, useRef, useState, type FormEvent } from 'react'
import { Button } from '@/components/ui/button'
import { Mark } from '@/components/ui/mark'
import { apiPost, ApiError, failureMessage } from '@/lib/client/api'
import { signOut } from '@/lib/client/auth-client'

type UnlockFormProps = {
  name: string
  /** On a page of its own the field takes focus by itself; over a page the cover gives it focus. */
  takesFocus?: boolean
  onUnlocked: () => void
}

/**
 * One password field. Made without the form library, because it lies over every page and would make each of them heavier;
 * the server checks with unlockSessionSchema.
 */
export function UnlockForm({ name, takesFocus = false, onUnlocked }: UnlockFormProps) {
  const id = useId()
  const field = useRef<HTMLInputElement>(null)
  const [error, setError] = useState<{ message: string; isEnded: boolean } | null>(null)
  const [isSending, setSending] = useState(false)

  const refuse = (message: string, isEnded = false) => {
    setError({ message, isEnded })
    field.current?.focus()
    field.current?.select()
  }

  const unlock = async () => {
    const password = field.current?.value ?? ''
    if (password === '') return refuse('Write your password.')
    setSending(true)
    try {
      await apiPost('/api/session/unlock', { password })
      if (field.current) field.current.value = ''
      setError(null)
      onUnlocked()
    } catch (failure) {
      const dto = failure instanceof ApiError ? failure.dto : null
      refuse(dto?.fields?.password ?? failureMessage(failure), dto?.code === 'UNAUTHENTICATED')
    } finally {
      setSending(false)
    }
  }

  const onSubmit = (event: FormEvent) => {
    event.preventDefault()
    if (!isSending) void unlock()
  }

  return (
    <form method="post" noValidate aria-label="Unlock" className="flex flex-col items-start gap-4" onSubmit={onSubmit}>
      <div className="flex flex-col gap-1.5">
        <label htmlFor={id} className="font-semibold">
          Password of {name}
        </label>
        <input
          id={id}
          ref={field}
          type="password"
          name="password"
          autoComplete="current-password"
          autoCapitalize="off"
          spellCheck={false}
          autoFocus={takesFocus}
          aria-invalid={error ? true : undefined}
          aria-describedby={error ? `${id}error` : undefined}
          className="min-h-[44px] w-[24ch] max-w-full rounded-control border border-muted/80 bg-field px-3.5 text-ink aria-invalid:border-2 aria-invalid:border-stop"
        />
        <div role="alert">
          {error ? (
            <p id={`${id}error`} className="flex items-baseline gap-1.5 font-semibold text-stop">
              <Mark shape="late" className="translate-y-[0.08em]" />
              <span>{error.message}</span>
            </p>
          ) : null}
        </div>
        {error?.isEnded ? (
          <a href="/sign-in" target="_blank" rel="noreferrer" className="inline-block min-h-[44px] py-2.5 underline">
            Sign in in a new tab, then come back to this one
          </a>
        ) : null}
      </div>
      <div className="flex flex-wrap gap-3">
        <Button type="submit" variant="primary" aria-busy={isSending || undefined}>
          <span aria-live="polite">{isSending ? 'Unlocking…' : 'Unlock'}</span>
        </Button>
        <Button variant="quiet" onClick={() => void signOut().catch((failure: unknown) => refuse(failureMessage(failure)))}>
          Sign in as somebody else
        </Button>
      </div>
    </form>
  )
}
