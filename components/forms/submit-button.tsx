'use client'

import type { ReactNode } from 'react'
import { Button, type ButtonVariant } from '@/components/ui/button'

type SubmitButtonProps = {
  isSending: boolean
  children: ReactNode
  /** Said while the answer is awaited. */
  sendingLabel?: string
  variant?: ButtonVariant
}

/** Sends the form. Never disabled: pressed too early it leads to what is missing, and a second tap while sending does nothing. */
export function SubmitButton({ isSending, children, sendingLabel = 'Recording…', variant = 'primary' }: SubmitButtonProps) {
  return (
    <Button
      type="submit"
      variant={variant}
      aria-busy={isSending || undefined}
      onClick={(event) => {
        if (isSending) event.preventDefault()
      }}
    >
      <span aria-live="polite">{isSending ? sendingLabel : children}</span>
    </Button>
  )
}
