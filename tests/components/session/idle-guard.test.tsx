import { act, fireEvent, render, screen } from '@testing-library/react'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { IdleGuard } from '@/components/session/idle-guard'
import { LOCKED_EVENT } from '@/lib/client/api'

const MINUTE_MS = 60_000
const EMAIL = 'rowan@example.invalid'
type Call = { path: string; method: string; isActive: boolean; body: unknown }

// Not drawn by jsdom.
window.scrollTo = () => {}

let calls: Call[]
/** What the stand-in for the network answers next, by path. */
let answers: Record<string, { status: number; body: unknown }>

beforeEach(() => {
  vi.useFakeTimers({
    now: Date.UTC(2026, 2, 3, 8),
    toFake: ['Date', 'setTimeout', 'clearTimeout', 'setInterval', 'clearInterval'],
  })
  calls = []
  answers = { '/api/me': { status: 200, body: { email: EMAIL, isLocked: false } } }
  vi.stubGlobal('fetch', (path: string, init: RequestInit = {}) => {
    const headers = new Headers(init.headers)
    const body: unknown = typeof init.body === 'string' ? JSON.parse(init.body) : null
    calls.push({ path, method: init.method ?? 'GET', isActive: headers.get('x-daybreath-active') === '1', body })
    const { status, body: answer } = answers[path] ?? { status: 200, body: {} }
    return Promise.resolve(Response.json(answer, { status }))
  })
})

afterEach(() => {
  vi.useRealTimers()
  vi.unstubAllGlobals()
})

function showPage(idleLockMin = 15) {
  const view = render(
    <div>
      <h1>Bed M11, Nakagawa</h1>
      <input aria-label="FiO2" defaultValue="" />
      <IdleGuard name="Rowan Hale" email={EMAIL} idleLockMin={idleLockMin} />
    </div>,
  )
  return { ...view, isDrawn: () => view.container.style.display !== 'none' }
}
const pass = (ms: number) => act(() => vi.advanceTimersByTimeAsync(ms))
const cover = () => screen.queryByRole('dialog', { name: 'This screen is locked' })
const serverLocks = () => act(async () => void window.dispatchEvent(new Event(LOCKED_EVENT)))
const giveBack = async (password: string) => {
  fireEvent.change(screen.getByLabelText('Password of Rowan Hale'), { target: { value: password } })
  await act(async () => void fireEvent.submit(screen.getByRole('form', { name: 'Unlock' })))
}

describe('the idle guard', () => {
  it('locks after the minutes of the hospital, takes the page out of sight, and tells the server', async () => {
    const page = showPage(2)
    await pass(2 * MINUTE_MS - 1000)
    expect(cover()).toBeNull()
    expect(page.isDrawn()).toBe(true)
    await pass(1000)
    expect(cover()).not.toBeNull()
    expect(page.isDrawn()).toBe(false)
    expect(document.title).toBe('Locked')
    expect(calls).toEqual([{ path: '/api/session/lock', method: 'POST', isActive: false, body: {} }])
  })

  it('counts typing and pointing as work', async () => {
    showPage(2)
    for (let minutes = 0; minutes < 5; minutes += 1) {
      await pass(MINUTE_MS)
      fireEvent[minutes % 2 === 0 ? 'keyDown' : 'pointerMove'](document.body)
    }
    expect(cover()).toBeNull()
    await pass(2 * MINUTE_MS)
    expect(cover()).not.toBeNull()
  })

  it('tells the server of work at most every 30 s, and of no work never', async () => {
    showPage(15)
    await pass(5 * MINUTE_MS)
    expect(calls).toEqual([])
    for (let tenths = 0; tenths < 20; tenths += 1) {
      fireEvent.pointerMove(document.body)
      await pass(1000)
    }
    expect(calls).toEqual([{ path: '/api/me', method: 'GET', isActive: true, body: null }])
  })

  it('locks when a sleeping computer wakes, before the first touch counts as work', async () => {
    const page = showPage(15)
    vi.setSystemTime(Date.now() + 60 * MINUTE_MS)
    await act(async () => void fireEvent.pointerMove(document.body))
    expect(page.isDrawn()).toBe(false)
    expect(calls.map((call) => call.path)).toEqual(['/api/session/lock'])
  })

  it('locks when the server says so', async () => {
    showPage()
    await serverLocks()
    expect(cover()).not.toBeNull()
  })

  it('brings the page back with what was typed, focus and title, after the right password', async () => {
    document.title = 'Screen'
    const page = showPage()
    const field = screen.getByLabelText<HTMLInputElement>('FiO2')
    fireEvent.change(field, { target: { value: '0.45' } })
    field.focus()
    await serverLocks()
    await giveBack('the right one')
    expect(calls.at(-1)).toMatchObject({ path: '/api/session/unlock', body: { password: 'the right one' } })
    expect(cover()).toBeNull()
    expect(page.isDrawn()).toBe(true)
    expect([field.value, document.activeElement === field, document.title]).toEqual(['0.45', true, 'Screen'])
    await pass(14 * MINUTE_MS)
    expect(cover()).toBeNull()
    await pass(MINUTE_MS)
    expect(cover()).not.toBeNull()
  })

  it('stays locked after a wrong password and says what is wrong at the field', async () => {
    const page = showPage()
    await serverLocks()
    const message = 'That is not your password. 4 tries are left before you are signed out.'
    answers['/api/session/unlock'] = {
      status: 422,
      body: { code: 'INVALID', message: 'Look', fields: { password: message }, requestId: 'r' },
    }
    await giveBack('wrong')
    expect(page.isDrawn()).toBe(false)
    const field = screen.getByLabelText('Password of Rowan Hale')
    expect(field.getAttribute('aria-invalid')).toBe('true')
    expect(document.getElementById(field.getAttribute('aria-describedby') ?? '')?.textContent).toBe(message)
  })

  it('asks for the password when none was written, without troubling the server', async () => {
    showPage()
    await serverLocks()
    calls = []
    await giveBack('')
    expect(screen.getByText('Write your password.')).toBeTruthy()
    expect(calls).toEqual([])
  })

  it('cannot be closed with Escape', async () => {
    const page = showPage()
    await serverLocks()
    const dialog = cover()
    fireEvent.keyDown(dialog ?? document.body, { key: 'Escape' })
    ;(dialog as HTMLDialogElement | null)?.close()
    expect(dialog?.hasAttribute('open')).toBe(true)
    expect(page.isDrawn()).toBe(false)
  })

  it('opens on return when the same person has unlocked elsewhere, and stays shut while still locked', async () => {
    const page = showPage()
    await serverLocks()
    answers['/api/me'] = { status: 200, body: { email: EMAIL, isLocked: true } }
    await act(async () => void window.dispatchEvent(new Event('focus')))
    expect(page.isDrawn()).toBe(false)
    answers['/api/me'] = { status: 200, body: { email: EMAIL, isLocked: false } }
    await act(async () => void window.dispatchEvent(new Event('focus')))
    expect(page.isDrawn()).toBe(true)
  })

  it('never brings the page back for somebody else who signed in meanwhile', async () => {
    const assign = vi.fn()
    vi.stubGlobal('location', { ...window.location, assign })
    const page = showPage()
    await serverLocks()
    answers['/api/me'] = { status: 200, body: { email: 'other@example.invalid', isLocked: false } }
    await act(async () => void window.dispatchEvent(new Event('focus')))
    expect(page.isDrawn()).toBe(false)
    expect(assign).toHaveBeenCalledWith('/')
  })
})
