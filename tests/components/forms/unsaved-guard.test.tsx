import { render, screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { AppRouterContext } from 'next/dist/shared/lib/app-router-context.shared-runtime'
import type { MouseEvent } from 'react'
import { expect, test, vi } from 'vitest'
import { UnsavedGuard } from '@/components/forms/unsaved-guard'
import { SIGNED_OUT_EVENT } from '@/lib/client/api'

function open(isDirty: boolean) {
  const push = vi.fn()
  const onFollowed = vi.fn((event: MouseEvent) => event.preventDefault())
  render(
    <AppRouterContext.Provider value={{ push } as never}>
      <a href="/units/micu/today" onClick={onFollowed}>
        Today
      </a>
      <UnsavedGuard isDirty={isDirty} />
    </AppRouterContext.Provider>,
  )
  return { push, onFollowed }
}

test('asks before a link leaves unsaved typing behind, and stays when told so', async () => {
  const { push, onFollowed } = open(true)
  const link = screen.getByRole('link', { name: 'Today' })
  await userEvent.click(link)
  expect(onFollowed).not.toHaveBeenCalled()
  expect(screen.getByRole('dialog', { name: 'Leave without recording?' })).toBeTruthy()
  await userEvent.click(screen.getByRole('button', { name: 'Stay here' }))
  expect(screen.queryByRole('dialog')).toBeNull()
  expect(document.activeElement).toBe(link)
  expect(push).not.toHaveBeenCalled()
})

test('leaves when that is what the person wants', async () => {
  const { push } = open(true)
  await userEvent.click(screen.getByRole('link', { name: 'Today' }))
  await userEvent.click(screen.getByRole('button', { name: 'Leave the page' }))
  expect(push).toHaveBeenCalledWith('/units/micu/today')
})

test('holds the tab and the end of the session back while there is unsaved typing, and only then', () => {
  const isHeld = (name: string) => !window.dispatchEvent(new Event(name, { cancelable: true }))
  const { unmount } = render(
    <AppRouterContext.Provider value={{} as never}>
      <UnsavedGuard isDirty />
    </AppRouterContext.Provider>,
  )
  expect([isHeld('beforeunload'), isHeld(SIGNED_OUT_EVENT)]).toEqual([true, true])
  unmount()
  expect([isHeld('beforeunload'), isHeld(SIGNED_OUT_EVENT)]).toEqual([false, false])
})

test('does not come between the reader and a link when nothing was typed', async () => {
  const { onFollowed } = open(false)
  await userEvent.click(screen.getByRole('link', { name: 'Today' }))
  expect(onFollowed).toHaveBeenCalledOnce()
})
