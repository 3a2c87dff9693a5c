'use client'

import Link from 'next/link'
import { useEffect, useRef, useState, type RefObject } from 'react'
import { failureMessage } from '@/lib/client/api'
import { lockScreen, signOut } from '@/lib/client/auth-client'
import { KeySwitch } from './key-switch'
import { ThemeSwitch, type Theme } from './theme-switch'

const ITEM =
  'flex min-h-[44px] w-full cursor-pointer items-center text-left font-semibold underline decoration-line decoration-2 underline-offset-4 hover:decoration-ink'

/** The person's own corner: who is signed in, lock, account, day or night, sign out. */
export function AccountMenu({ name, roles, theme }: { name: string; roles: readonly string[]; theme: Theme }) {
  const [isOpen, setOpen] = useState(false)
  const [problem, setProblem] = useState<string | null>(null)
  const menu = useRef<HTMLDivElement>(null)
  const opener = useRef<HTMLButtonElement>(null)
  useClosing(isOpen, menu, () => setOpen(false))

  const act = async (work: () => Promise<void>) => {
    setProblem(null)
    try {
      await work()
      setOpen(false)
    } catch (error) {
      setProblem(failureMessage(error))
    }
  }

  const lockAndClose = () => {
    setOpen(false)
    lockScreen()
  }

  return (
    <div
      ref={menu}
      className="relative"
      onKeyDown={(event) => {
        if (event.key !== 'Escape' || !isOpen) return
        setOpen(false)
        opener.current?.focus()
      }}
    >
      <button
        ref={opener}
        type="button"
        aria-expanded={isOpen}
        aria-controls="account-menu"
        className="inline-flex min-h-[44px] max-w-[48vw] cursor-pointer items-center gap-2 rounded-control px-2 font-semibold"
        onClick={() => setOpen(!isOpen)}
      >
        <span className="truncate">{name}</span>
        <svg viewBox="0 0 12 8" aria-hidden="true" className="h-2 w-3 shrink-0">
          <path d="M1.5 1.5 6 6l4.5-4.5" fill="none" stroke="currentColor" strokeWidth="2" strokeLinecap="round" />
        </svg>
      </button>
      <div
        id="account-menu"
        hidden={!isOpen}
        className="absolute right-0 z-40 w-[min(20rem,calc(100vw-2rem))] rounded-control border border-line bg-paper p-4 shadow-lg"
      >
        <p className="font-semibold">{name}</p>
        {roles.map((role) => (
          <p key={role} className="text-sm text-muted">
            {role}
          </p>
        ))}
        <button type="button" className={ITEM} onClick={lockAndClose}>
          Lock this screen now
        </button>
        <Link href="/account" onClick={() => setOpen(false)} className={ITEM}>
          Account
        </Link>
        <ThemeSwitch theme={theme} />
        <KeySwitch />
        <button type="button" className={ITEM} onClick={() => void act(signOut)}>
          Sign out
        </button>
        <p role="alert" className="font-semibold text-stop">
          {problem}
        </p>
      </div>
    </div>
  )
}

function useClosing(isOpen: boolean, menu: RefObject<HTMLDivElement | null>, close: () => void): void {
  useEffect(() => {
    if (!isOpen) return
    const onPointer = (event: PointerEvent) => {
      if (event.target instanceof Node && !menu.current?.contains(event.target)) close()
    }
    document.addEventListener('pointerdown', onPointer)
    return () => document.removeEventListener('pointerdown', onPointer)
  })
}
