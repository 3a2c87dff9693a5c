'use client'

import { useState } from 'react'
import { writeCookie } from '@/lib/client/cookie'
import { cn } from '@/lib/shared/cn'

export type Theme = 'day' | 'night' | 'device'
const WORDS: Record<Theme, string> = { day: 'Day', night: 'Night', device: 'As the device' }

/** Day or night colours, kept in a cookie of this device. */
export function ThemeSwitch({ theme }: { theme: Theme }) {
  const [chosen, setChosen] = useState(theme)
  const choose = (next: Theme) => {
    setChosen(next)
    writeCookie('daybreath-theme', next, { isLasting: true })
    const isNight = next === 'night' || (next === 'device' && window.matchMedia('(prefers-color-scheme: dark)').matches)
    document.documentElement.classList.toggle('dark', isNight)
    document.documentElement.setAttribute('data-theme', next)
  }
  return (
    <fieldset className="my-2">
      <legend className="mb-1 text-sm text-muted">Colours</legend>
      <span className="inline-flex flex-wrap overflow-hidden rounded-control border border-muted/80">
        {(['day', 'night', 'device'] as const).map((each) => (
          <label
            key={each}
            className={cn(
              'focus-within-ring relative inline-flex min-h-[44px] cursor-pointer items-center px-3',
              each === chosen ? 'bg-ink font-semibold text-paper' : 'bg-field',
            )}
          >
            <input
              type="radio"
              name="theme"
              checked={each === chosen}
              onChange={() => choose(each)}
              className="absolute inset-0 size-full cursor-pointer appearance-none opacity-0"
            />
            {WORDS[each]}
          </label>
        ))}
      </span>
    </fieldset>
  )
}
