import { beforeEach, expect, test, vi } from 'vitest'
import { ApiError, apiGet, apiPost, failureMessage, LOCKED_EVENT } from '@/lib/client/api'

let init: RequestInit | undefined
let answer: Response

beforeEach(() => {
  answer = Response.json({ ok: true })
  vi.spyOn(globalThis, 'fetch').mockImplementation((_path, given) => {
    init = given
    return Promise.resolve(answer.clone())
  })
})
const header = (name: string) => new Headers(init?.headers).get(name)
const failed = (work: Promise<unknown>) =>
  work.then(
    () => null,
    (error: unknown) => error,
  )

test('marks a request as caused by a person only when it was: polling must not keep a screen open', async () => {
  await apiGet('/api/x')
  expect(header('x-daybreath-active')).toBeNull()
  await apiGet('/api/x', { isActive: true })
  expect(header('x-daybreath-active')).toBe('1')
  await apiPost('/api/x', {})
  expect(header('x-daybreath-active')).toBe('1')
})

test('never lets a cache answer', async () => {
  await apiGet('/api/x')
  expect(init?.cache).toBe('no-store')
})

test('hands the refusal of the server on with its words', async () => {
  answer = Response.json(
    { code: 'CONFLICT', message: 'A. Okafor has already recorded this hold.', requestId: 'r1' },
    { status: 409 },
  )
  const error = await failed(apiPost('/api/x', {}))
  expect(error).toBeInstanceOf(ApiError)
  expect(error).toMatchObject({
    message: 'A. Okafor has already recorded this hold.',
    dto: { code: 'CONFLICT', requestId: 'r1' },
  })
})

test.each([
  [502, 'INTERNAL'],
  [429, 'RATE_LIMITED'],
])('has words of its own for an answer %d that is not ours', async (status, code) => {
  answer = new Response('<html>gateway</html>', { status })
  const error = await failed(apiPost('/api/x', {}))
  expect(error).toMatchObject({ dto: { code } })
  expect(failureMessage(error)).toBe(`The server could not do this (answer ${status}). What you typed is still here.`)
})

test('tells the page that the screen is locked, also when it was only polling', async () => {
  const onLocked = vi.fn()
  window.addEventListener(LOCKED_EVENT, onLocked, { once: true })
  answer = Response.json({ code: 'LOCKED', message: 'Locked.', requestId: 'r' }, { status: 423 })
  await failed(apiGet('/api/x'))
  expect(onLocked).toHaveBeenCalledOnce()
})
