'use client'

import { useLayoutEffect, useRef } from 'react'
import { createPortal } from 'react-dom'
import { UnlockForm } from './unlock-form'
import { useIdleLock } from './use-idle-lock'

type IdleGuardProps = {
  name: string
  email: string
  /** Minutes without activity after which the hospital wants its screens locked. */
  idleLockMin: number
}

/**
 * Stands once in the frame of every signed-in page. While the screen is locked nothing of the page is drawn, printed or reachable, and
 * what was typed stays in it; the password brings it back as it was.
 */
export function IdleGuard({ name, email, idleLockMin }: IdleGuardProps) {
  const { isLocked, open } = useIdleLock({ email, idleLockMin })
  return isLocked ? <LockCover name={name} onUnlocked={open} /> : null
}

function LockCover({ name, onUnlocked }: { name: string; onUnlocked: () => void }) {
  const cover = useRef<HTMLDialogElement>(null)

  // Before the next paint, so that the page is not drawn once more beside the cover.
  useLayoutEffect(() => {
    const element = cover.current
    if (!element) return
    const bringBack = hideAllBut(element)
    if (!element.open) element.showModal()
    element.querySelector('input')?.focus()
    return () => {
      element.close()
      bringBack()
    }
  }, [])

  return createPortal(
    <dialog
      ref={cover}
      aria-labelledby="lock-title"
      // A browser may close a dialog on a second Escape without asking; it is opened again at once.
      onClose={(event) => {
        if (event.currentTarget.isConnected && !event.currentTarget.open) event.currentTarget.showModal()
      }}
      onCancel={(event) => event.preventDefault()}
      onKeyDown={(event) => {
        if (event.key === 'Escape') event.preventDefault()
      }}
      className="m-0 h-dvh max-h-none w-screen max-w-none bg-paper p-6 text-ink"
    >
      <div className="mx-auto mt-[12vh] max-w-[26rem]">
        <h2 id="lock-title" className="text-2xl font-bold">
          This screen is locked
        </h2>
        <p className="mt-2 mb-6 text-muted">What was typed on the page is still there and comes back with your password.</p>
        <UnlockForm name={name} onUnlocked={onUnlocked} />
      </div>
    </dialog>,
    document.body,
  )
}

/** Takes everything else out of the drawing, title and print of the page. Answers how to bring it back, with focus and place. */
function hideAllBut(shown: HTMLElement): () => void {
  const focused = document.activeElement
  const scroll = { left: window.scrollX, top: window.scrollY }
  const title = document.title
  const hidden = Array.from(document.body.children)
    .filter((child): child is HTMLElement => child instanceof HTMLElement && child !== shown)
    .map((child) => ({
      child,
      display: child.style.getPropertyValue('display'),
      priority: child.style.getPropertyPriority('display'),
    }))
  for (const { child } of hidden) child.style.setProperty('display', 'none', 'important')
  document.title = 'Locked'
  return () => {
    for (const { child, display, priority } of hidden) child.style.setProperty('display', display, priority)
    document.title = title
    window.scrollTo(scroll)
    if (focused instanceof HTMLElement && focused.isConnected) focused.focus()
  }
}
