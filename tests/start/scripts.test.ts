import { spawnSync } from 'node:child_process'
import { chmodSync, mkdirSync, readFileSync, statSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { missingPaths, namedPaths } from '@/lib/start/check-doc-paths.mjs'
import { findChromium } from '@/lib/start/ensure-chromium.mjs'
import { readPort } from '@/lib/start/process.mjs'
import { readOrMakeSecret } from '@/lib/start/secret.mjs'
import { hashFiles, isStamped, removeStamp, writeStamp } from '@/lib/start/stamp.mjs'
import { countBrowserTests, countUnitTests } from '@/lib/start/test-counts.mjs'
import { makeTestFolder } from '../helpers/database'

describe('a stamp', () => {
  function makeSources() {
    const folder = makeTestFolder()
    mkdirSync(join(folder, 'app'))
    writeFileSync(join(folder, 'app', 'a.ts'), '1')
    writeFileSync(join(folder, 'lock'), '1')
    return folder
  }
  const hash = (folder: string, facts: string[] = []) => hashFiles(folder, ['app', 'lock', 'absent'], facts)

  it('stays the same for the same files', () => {
    const folder = makeSources()
    expect(hash(folder)).toBe(hash(folder))
    expect(hash(folder)).toBe(hash(makeSources()))
  })

  it.each([
    ['a changed file', (folder: string) => writeFileSync(join(folder, 'app', 'a.ts'), '2')],
    ['a new file', (folder: string) => writeFileSync(join(folder, 'app', 'b.ts'), '')],
    [
      'text moved from one file to the next',
      (folder: string) => (writeFileSync(join(folder, 'app', 'a.ts'), ''), writeFileSync(join(folder, 'lock'), '11')),
    ],
  ])('differs after %s', (_what, change) => {
    const folder = makeSources()
    const before = hash(folder)
    change(folder)
    expect(hash(folder)).not.toBe(before)
  })

  it('differs for another Node version', () => {
    const folder = makeSources()
    expect(hash(folder, ['115'])).not.toBe(hash(folder, ['127']))
  })

  it('counts as done only when written for this hash and not removed', () => {
    const file = join(makeTestFolder(), 'stamp')
    expect(isStamped(file, 'a')).toBe(false)
    writeStamp(file, 'a')
    expect([isStamped(file, 'a'), isStamped(file, 'b')]).toEqual([true, false])
    removeStamp(file)
    expect(isStamped(file, 'a')).toBe(false)
  })
})

describe('counting tests', () => {
  const unit = { numTotalTests: 5, numPassedTests: 5, success: true, testResults: [{ status: 'passed', assertionResults: [{}] }] }
  const browser = { stats: { expected: 3, unexpected: 0, flaky: 0, skipped: 0 }, errors: [] as unknown[] }

  it('counts what passed', () => {
    expect(countUnitTests(unit)).toEqual({ passed: 5, failed: 0 })
    expect(countBrowserTests(browser)).toEqual({ passed: 3, failed: 0 })
  })

  it('counts failed and skipped unit tests as failed', () => {
    expect(countUnitTests({ ...unit, numPassedTests: 3, success: false })).toEqual({ passed: 3, failed: 2 })
  })

  it('counts a file that did not load', () => {
    const testResults = [{ status: 'failed', assertionResults: [] }]
    expect(countUnitTests({ ...unit, success: false, testResults })).toEqual({ passed: 5, failed: 1 })
  })

  it('counts a fault outside a test, and a run without tests', () => {
    expect(countUnitTests({ ...unit, success: false })).toEqual({ passed: 5, failed: 1 })
    expect(countUnitTests({ ...unit, numTotalTests: 0, numPassedTests: 0 })).toEqual({ passed: 0, failed: 1 })
    expect(countBrowserTests({ stats: { expected: 0, unexpected: 0, flaky: 0, skipped: 0 }, errors: [] })).toEqual({
      passed: 0,
      failed: 1,
    })
    expect(countBrowserTests({ ...browser, errors: [{}] })).toEqual({ passed: 3, failed: 1 })
  })

  it('counts skipped and flaky browser tests as failed', () => {
    expect(countBrowserTests({ stats: { expected: 1, unexpected: 1, flaky: 1, skipped: 1 }, errors: [] })).toEqual({
      passed: 1,
      failed: 3,
    })
  })
})

describe('paths in documents', () => {
  it('are those in backticks that look like ours', () => {
    const text =
      'See `lib/weaning/rsbi.ts`, `npm run demo`, `app/(unit)/`, `package.json`, `data/demo`, lib/plain.ts and `lib/services/<aggregate>/<verb>.ts:12`.'
    expect(namedPaths(text)).toEqual(['lib/weaning/rsbi.ts', 'app/(unit)/', 'package.json', 'lib/services'])
  })

  it('are missed when they do not exist', () => {
    expect(missingPaths('`lib/start/setup.mjs` `policy.ts` `lib/policy.ts` `lib/start/gone.mjs` `gone.json`', '.')).toEqual([
      'lib/policy.ts',
      'lib/start/gone.mjs',
      'gone.json',
    ])
  })
})

describe('finding a browser', () => {
  function makeProgram(mode: number) {
    const folder = makeTestFolder()
    const file = join(folder, 'chromium')
    writeFileSync(file, '#!/bin/sh\n')
    chmodSync(file, mode)
    return { folder, file }
  }

  it('looks along the path', () => {
    const { folder, file } = makeProgram(0o755)
    expect(findChromium({ PATH: folder })).toBe(file)
  })

  it('finds none where there is none', () => {
    expect(findChromium({ PATH: makeTestFolder() })).toBeNull()
  })

  it('takes the one that is named, and refuses a name that is no program', () => {
    const { file } = makeProgram(0o755)
    expect(findChromium({ PATH: '', DAYBREATH_CHROMIUM: file })).toBe(file)
    expect(() => findChromium({ DAYBREATH_CHROMIUM: '/nowhere/chromium' })).toThrow('/nowhere/chromium')
  })
})

describe('starting', () => {
  it('keeps one secret, readable by its owner only', () => {
    const file = join(makeTestFolder(), 'data', 'demo', 'secret')
    const secret = readOrMakeSecret(file)
    expect(secret.length).toBeGreaterThanOrEqual(32)
    expect(readOrMakeSecret(file)).toBe(secret)
    expect(readFileSync(file, 'utf8')).toBe(secret)
    expect(statSync(file).mode & 0o777).toBe(0o600)
  })

  it.each(['0', '65536', 'abc', '80.5', '-1'])('refuses port %s', (port) => {
    expect(() => readPort(port, 3000)).toThrow('PORT')
  })

  it('takes a given port, else the usual one', () => {
    expect([readPort('8080', 3000), readPort('', 3000), readPort(undefined, 3000)]).toEqual([8080, 3000, 3000])
  })

  it.each([
    ['is missing', ''],
    ['is too short', 'x'.repeat(31)],
  ])('real use stops at once when the secret %s', (wrong, secret) => {
    const done = spawnSync(process.execPath, ['lib/start/start.mjs'], {
      env: { ...process.env, DAYBREATH_SECRET: secret },
      encoding: 'utf8',
    })
    expect(done.status).toBe(1)
    expect(done.stderr).toContain(`DAYBREATH_SECRET ${wrong}`)
    expect(done.stdout).toBe('')
  })

  it('the demo refuses an argument it does not know', () => {
    const done = spawnSync(process.execPath, ['lib/start/demo.mjs', '--frehs'], { encoding: 'utf8' })
    expect(done.status).toBe(1)
    expect(done.stderr).toContain('Unknown: --frehs')
  })

  it('the start scripts need nothing that has to be installed first', () => {
    for (const name of [
      'process',
      'stamp',
      'setup',
      'build',
      'start',
      'dev',
      'demo',
      'secret',
      'test',
      'test-e2e',
      'test-counts',
      'ensure-chromium',
      'check-doc-paths',
      'backup',
    ]) {
      const text = readFileSync(`lib/start/${name}.mjs`, 'utf8')
      const sources = [...text.matchAll(/^import .* from '([^']+)'/gms)].map(([, source = '']) => source)
      expect(
        sources.filter((source) => !source.startsWith('node:') && !source.startsWith('./')),
        name,
      ).toEqual([])
    }
  })
})
