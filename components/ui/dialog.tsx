'use client'

import { useEffect, useId, useRef, type ReactNode } from 'react'
import { Button } from './button'

type DialogProps = {
  isOpen: boolean
  title: string
  /** Called for Escape and the close button; a dialog that must be answered leaves it out. */
  onClose?: () => void
  children: ReactNode
  closeLabel?: string
}

/** A modal dialog on the browser's own element: it keeps focus inside and gives it back to where it was. */
export function Dialog({ isOpen, title, onClose, children, closeLabel = 'Close' }: DialogProps) {
  const dialog = useRef<HTMLDialogElement>(null)
  const titleId = useId()

  useEffect(() => {
    const element = dialog.current
    if (!element || !isOpen) return
    const cameFrom = document.activeElement
    if (!element.open) element.showModal()
    return () => {
      element.close()
      if (cameFrom instanceof HTMLElement && cameFrom.isConnected) cameFrom.focus()
    }
  }, [isOpen])

  return (
    <dialog
      ref={dialog}
      aria-labelledby={titleId}
      onCancel={(event) => {
        event.preventDefault()
        onClose?.()
      }}
      className="m-auto w-[min(34rem,calc(100vw-2rem))] rounded-control border border-line bg-paper p-6 text-ink"
    >
      {isOpen ? (
        <>
          <h2 id={titleId} className="mb-3 text-xl font-bold">
            {title}
          </h2>
          {children}
          {onClose ? (
            <Button variant="quiet" onClick={onClose} className="mt-4">
              {closeLabel}
            </Button>
          ) : null}
        </>
      ) : null}
    </dialog>
  )
}
