'use client'

import { useSyncExternalStore } from 'react'
import { readCookie, subscribeCookies, writeCookie } from '@/lib/client/cookie'

export const KEYS_COOKIE = 'daybreath-keys'

/** Turns the single-letter key of Today off, for people whom it gets in the way (voice control). WCAG 2.2, 2.1.4. */
export function KeySwitch() {
  const isOn = useSyncExternalStore(
    subscribeCookies,
    () => readCookie(KEYS_COOKIE) !== 'off',
    () => true,
  )
  return (
    <label className="flex min-h-[44px] cursor-pointer items-center gap-3">
      <input
        type="checkbox"
        className="size-5 accent-current"
        checked={isOn}
        onChange={(event) => writeCookie(KEYS_COOKIE, event.target.checked ? 'on' : 'off', { isLasting: true })}
      />
      <span>
        Key <kbd className="figure rounded border border-line px-1.5">h</kbd> hides names on Today
      </span>
    </label>
  )
}
