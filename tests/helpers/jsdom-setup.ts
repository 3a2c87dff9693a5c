import { cleanup } from '@testing-library/react'
import { afterEach, beforeEach, expect, vi, type MockInstance } from 'vitest'

// Charts and dialogs ask for these; jsdom has neither.
class StillObserver {
  observe(): void {}
  unobserve(): void {}
  disconnect(): void {}
}
vi.stubGlobal('ResizeObserver', StillObserver)

// Names of fields hold dots and nothing stranger.
if (typeof CSS === 'undefined') vi.stubGlobal('CSS', { escape: (text: string) => text.replace(/[^\w-]/g, '\\$&') })

HTMLDialogElement.prototype.showModal ??= function showModal(this: HTMLDialogElement) {
  this.setAttribute('open', '')
}
HTMLDialogElement.prototype.close ??= function close(this: HTMLDialogElement) {
  this.removeAttribute('open')
  this.dispatchEvent(new Event('close'))
}

let consoleError: MockInstance<typeof console.error>

beforeEach(() => {
  consoleError = vi.spyOn(console, 'error').mockImplementation(() => {})
})

// An unexpected console error fails the test; a test that expects one asserts it and calls mockClear().
afterEach(() => {
  const complaints = consoleError.mock.calls.map((call) => call.map(String).join(' '))
  cleanup()
  consoleError.mockRestore()
  expect(complaints).toEqual([])
})
