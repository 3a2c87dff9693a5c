// npm run test:e2e: the browser tests against the production build. Arguments go on to the test runner.
import { build } from './build.mjs'
import { ensureChromium } from './ensure-chromium.mjs'
import { main, Refusal, run } from './process.mjs'
import { setup } from './setup.mjs'

/** Runs the browser tests; the exit code is the runner's. */
export async function runBrowserTests(args, env = {}) {
  const chromium = await ensureChromium()
  return run(process.execPath, ['node_modules/@playwright/test/cli.js', 'test', ...args], {
    env: { ...env, DAYBREATH_CHROMIUM: chromium, NEXT_TELEMETRY_DISABLED: '1' },
  })
}

async function testE2e(args) {
  await setup()
  await build()
  if ((await runBrowserTests(args)) !== 0) throw new Refusal('The browser tests failed.')
}

main(import.meta.url, testE2e)
