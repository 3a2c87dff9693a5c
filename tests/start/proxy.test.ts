import { NextRequest } from 'next/server'
import { describe, expect, it, vi } from 'vitest'
import { SESSION_COOKIE_NAMES } from '@/lib/server/session-cookie'
import { config, proxy } from '@/proxy'

const ask = (path: string, cookie?: string) =>
  proxy(new NextRequest(`http://localhost:3000${path}`, { headers: cookie ? { cookie } : {} }))
const SIGNED_IN = `${SESSION_COOKIE_NAMES[0]}=anything`

describe('before a page', () => {
  it('sends somebody without a session to sign in, and back afterwards', () => {
    const answer = ask('/units/u1/today?day=2026-03-03')
    expect(answer.status).toBe(307)
    expect(answer.headers.get('location')).toBe('http://localhost:3000/sign-in?next=%2Funits%2Fu1%2Ftoday%3Fday%3D2026-03-03')
    expect(answer.headers.get('cache-control')).toBe('no-store')
    expect(ask('/').headers.get('location')).toBe('http://localhost:3000/sign-in')
  })

  it.each(['/sign-in', '/forgot-password', '/reset-password?token=t', '/accept?token=t'])('leaves %s open', (path) => {
    expect(ask(path).headers.get('location')).toBeNull()
  })

  it.each(['/sign-inner', '/accepted'])('does not take %s for an open page', (path) => {
    expect(ask(path).status).toBe(307)
  })

  it.each([...SESSION_COOKIE_NAMES])('lets the cookie %s through', (name) => {
    expect(ask('/', `${name}=anything`).status).toBe(200)
  })

  it('gives every page a policy with a nonce of its own, and hands it to the page', () => {
    const [first, second] = [ask('/', SIGNED_IN), ask('/', SIGNED_IN)]
    const policy = first.headers.get('content-security-policy') ?? ''
    const nonce = /script-src 'self' 'nonce-([A-Za-z0-9+/=]{22,})' 'strict-dynamic'/.exec(policy)?.[1]
    expect(nonce).toBeDefined()
    expect(first.headers.get('x-middleware-request-x-nonce')).toBe(nonce)
    expect(first.headers.get('x-middleware-request-content-security-policy')).toBe(policy)
    expect(second.headers.get('content-security-policy')).not.toBe(policy)
    expect(policy).not.toContain('unsafe-eval')
    expect(policy).not.toMatch(/script-src[^;]*unsafe-inline/)
    for (const rule of [
      `default-src 'self'`,
      `object-src 'none'`,
      `base-uri 'none'`,
      `form-action 'self'`,
      `frame-ancestors 'none'`,
    ]) {
      expect(policy).toContain(rule)
    }
  })

  it('overwrites what a caller claims about path and nonce', () => {
    const request = new NextRequest('http://localhost:3000/units/u1', {
      headers: { cookie: SIGNED_IN, 'x-nonce': 'mine', 'x-daybreath-path': '/elsewhere' },
    })
    const answer = proxy(request)
    expect(answer.headers.get('x-middleware-request-x-daybreath-path')).toBe('/units/u1')
    expect(answer.headers.get('x-middleware-request-x-nonce')).not.toBe('mine')
  })

  it('asks for https only where people type https', () => {
    vi.stubEnv('DAYBREATH_BASE_URL', 'http://localhost:3000')
    expect(ask('/', SIGNED_IN).headers.get('strict-transport-security')).toBeNull()
    vi.stubEnv('DAYBREATH_BASE_URL', 'https://daybreath.example')
    expect(ask('/', SIGNED_IN).headers.get('strict-transport-security')).toBe('max-age=31536000')
  })

  it('stays away from routes and from files of the build', () => {
    const pattern = new RegExp(`^${config.matcher[0]}$`)
    expect(['/', '/units/u1', '/sign-in', '/apiary'].map((path) => pattern.test(path))).toEqual([true, true, true, true])
    expect(['/api/today', '/_next/static/a.js', '/favicon.ico'].map((path) => pattern.test(path))).toEqual([false, false, false])
  })
})
