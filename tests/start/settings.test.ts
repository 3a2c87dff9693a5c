import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { parseEnv } from '@/lib/server/env'

const SECRET = 'x'.repeat(32)

describe('settings', () => {
  it('have safe values when only the secret is given', () => {
    expect(parseEnv({ DAYBREATH_SECRET: SECRET })).toMatchObject({
      databaseFile: 'data/daybreath.db',
      baseUrl: 'http://localhost:3000',
      isDemo: false,
      runsJobs: true,
      trustedProxyHeader: null,
      smtpUrl: null,
    })
  })

  it('treat an empty value as not given', () => {
    expect(parseEnv({ DAYBREATH_SECRET: SECRET, SMTP_URL: '', DAYBREATH_DEMO: '' })).toMatchObject({
      smtpUrl: null,
      isDemo: false,
    })
    expect(() => parseEnv({ DAYBREATH_SECRET: '' })).toThrow('DAYBREATH_SECRET is missing')
  })

  it.each([
    ['no secret', {}, 'DAYBREATH_SECRET is missing'],
    ['a short secret', { DAYBREATH_SECRET: 'x'.repeat(31) }, 'DAYBREATH_SECRET is too short'],
    [
      'an address without http',
      { DAYBREATH_SECRET: SECRET, DAYBREATH_BASE_URL: 'daybreath.example' },
      'DAYBREATH_BASE_URL must be the address',
    ],
    ['another yes', { DAYBREATH_SECRET: SECRET, DAYBREATH_DEMO: 'yes' }, 'DAYBREATH_DEMO must be 0 or 1'],
    ['a mail server without smtp', { DAYBREATH_SECRET: SECRET, SMTP_URL: 'mail.example:25' }, 'SMTP_URL must begin with smtp://'],
  ])('are refused with %s, by name', (_what, given, message) => {
    expect(() => parseEnv(given)).toThrow(message)
  })

  it('names every wrong one at once', () => {
    const parse = () => parseEnv({ DAYBREATH_DEMO: '2', SMTP_URL: 'x' })
    for (const name of ['DAYBREATH_SECRET', 'DAYBREATH_DEMO', 'SMTP_URL']) expect(parse).toThrow(name)
  })

  it('never repeat the secret in a message', () => {
    expect(() => parseEnv({ DAYBREATH_SECRET: 'short-but-mine' })).toThrow(
      expect.not.objectContaining({ message: expect.stringContaining('short-but-mine') }),
    )
  })

  it('are each explained in .env.example, and nothing else is', () => {
    const explained = [...readFileSync('.env.example', 'utf8').matchAll(/^([A-Z_]+)=/gm)].map(([, name]) => name)
    const read = [...readFileSync('lib/server/env.ts', 'utf8').matchAll(/^ {2}([A-Z_]+): z/gm)].map(([, name]) => name)
    // Read by the start script alone.
    const readAtStart = ['DAYBREATH_HOST', 'PORT']
    expect(explained.sort()).toEqual([...read, ...readAtStart].sort())
  })

  it('ship no secret in .env.example', () => {
    expect(readFileSync('.env.example', 'utf8')).toMatch(/^DAYBREATH_SECRET=$/m)
  })
})
