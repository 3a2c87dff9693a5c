// npm test: everything, from a bare checkout. Set-up, checks, unit and integration tests, production build, browser tests.
// Goes through to the end even when something fails, and ends with one line that counts it all.
import { mkdtempSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { build } from './build.mjs'
import { ensureChromium } from './ensure-chromium.mjs'
import { main, run, runNpm, say } from './process.mjs'
import { setup } from './setup.mjs'
import { countBrowserTests, countUnitTests } from './test-counts.mjs'
import { runBrowserTests } from './test-e2e.mjs'

/** A part that has no tests of its own counts only when it fails. */
async function countStep(what, work) {
  say(`\n== ${what}`)
  try {
    const code = await work()
    if (code === 0) return { passed: 0, failed: 0 }
    say(`${what}: failed`)
  } catch (error) {
    say(`${what}: failed. ${error instanceof Error ? error.message : error}`)
  }
  return { passed: 0, failed: 1 }
}

/** Runs one test runner and counts its report; a missing report or a bad exit code is a failure. */
async function countRunner(what, file, runTests, count) {
  say(`\n== ${what}`)
  try {
    const code = await runTests()
    const counts = count(JSON.parse(readFileSync(file, 'utf8')))
    return code !== 0 && counts.failed === 0 ? { ...counts, failed: 1 } : counts
  } catch (error) {
    say(`${what}: no report. ${error instanceof Error ? error.message : error}`)
    return { passed: 0, failed: 1 }
  }
}

async function test() {
  await setup()
  const folder = mkdtempSync(join(tmpdir(), 'daybreath-reports-'))
  const unitReport = join(folder, 'unit.json')
  const browserReport = join(folder, 'browser.json')
  const unitArgs = [
    'node_modules/vitest/vitest.mjs',
    'run',
    '--reporter=default',
    '--reporter=json',
    `--outputFile.json=${unitReport}`,
  ]
  const results = [
    await countStep('Browser for the tests', async () => ((await ensureChromium()) ? 0 : 1)),
    await countStep('Format, lint, import directions, types, paths in documents', () => runNpm(['run', '--silent', 'check'])),
    await countRunner('Unit and integration tests', unitReport, () => run(process.execPath, unitArgs), countUnitTests),
  ]
  const buildResult = await countStep('Production build', async () => (await build(), 0))
  results.push(buildResult)
  if (buildResult.failed === 0) {
    const env = { PLAYWRIGHT_JSON_OUTPUT_NAME: browserReport }
    results.push(
      await countRunner('Browser tests', browserReport, () => runBrowserTests(['--reporter=list,json'], env), countBrowserTests),
    )
  }
  rmSync(folder, { recursive: true, force: true })
  const sum = (key) => results.reduce((total, result) => total + result[key], 0)
  say(`\n${sum('passed')} passed, ${sum('failed')} failed`)
  process.exitCode = sum('failed') === 0 ? 0 : 1
}

main(import.meta.url, test)
