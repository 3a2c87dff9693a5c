import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { defineConfig } from '@playwright/test'

const chromium = process.env.DAYBREATH_CHROMIUM ?? '/usr/bin/chromium'
const folder = (name: string) => join(tmpdir(), `daybreath-e2e-${name}`)
const server = (port: number, name: string, flags: string) => ({
  command: `node lib/start/serve-for-tests.mjs --port ${port} --folder ${folder(name)} ${flags}`,
  url: `http://127.0.0.1:${port}/api/health`,
  timeout: 180_000,
  reuseExistingServer: false,
  gracefulShutdown: { signal: 'SIGTERM', timeout: 5_000 } as const,
})

// Two servers of the production build: one with an empty database, set up by the tests as a person would; one with the demo hospital.
export default defineConfig({
  testDir: 'tests/e2e',
  outputDir: 'test-results',
  workers: 1,
  retries: 0,
  forbidOnly: true,
  timeout: 90_000,
  expect: { timeout: 10_000 },
  reporter: [['list']],
  webServer: [server(3211, 'empty', ''), server(3212, 'demo', '--demo')],
  use: {
    baseURL: 'http://localhost:3211',
    locale: 'en-GB',
    timezoneId: 'Etc/UTC',
    trace: 'retain-on-failure',
    launchOptions: {
      executablePath: chromium,
      args: [
        ...(process.getuid?.() === 0 ? ['--no-sandbox'] : []),
        '--disable-gpu',
        '--disable-dev-shm-usage',
        '--disable-background-networking',
        '--disable-component-update',
        '--disable-sync',
        '--no-first-run',
      ],
    },
  },
})
