'use client'

import { useEffect, useState } from 'react'
import { readCookie, writeCookie } from '@/lib/client/cookie'

/** Whether names are hidden on this screen; the switch and the key "h" change it, and this session of the browser remembers it. */
export function useHiddenNames(atFirst: boolean): { isHidden: boolean; setHidden: (isHidden: boolean) => void } {
  const [isHidden, setState] = useState(atFirst)
  const setHidden = (next: boolean) => {
    setState(next)
    writeCookie('daybreath-names', next ? 'hidden' : 'shown')
  }
  useEffect(() => {
    const onKey = (event: KeyboardEvent) => {
      if (event.key.toLowerCase() !== 'h' || event.ctrlKey || event.metaKey || event.altKey || event.repeat) return
      if (isTyping(event.target) || readCookie('daybreath-keys') === 'off' || document.querySelector('dialog[open]')) return
      setHidden(!isHidden)
    }
    document.addEventListener('keydown', onKey)
    return () => document.removeEventListener('keydown', onKey)
  })
  return { isHidden, setHidden }
}

function isTyping(target: EventTarget | null): boolean {
  if (!(target instanceof HTMLElement)) return false
  if (target instanceof HTMLInputElement) return target.type !== 'radio' && target.type !== 'checkbox'
  return target instanceof HTMLTextAreaElement || target instanceof HTMLSelectElement || target.isContentEditable
}
