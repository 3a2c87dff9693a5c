import { defineConfig } from '@playwright/test'
import { DEMO_PASSWORD, PORTS, SMTP_URL, MAILBOX_URL, testFolder } from './tests/e2e/support/places'

const chromium = process.env.DAYBREATH_CHROMIUM ?? '/usr/bin/chromium'
const program = 'node --conditions=react-server --import tsx'

const server = (name: 'empty' | 'demo' | 'ward', flags: string, before = '') => ({
  command: `${before}exec node lib/start/serve-for-tests.mjs --port ${PORTS[name]} --folder ${testFolder(name)} ${flags}`,
  url: `http://127.0.0.1:${PORTS[name]}/api/health`,
  env: { DAYBREATH_TEST_SMTP_URL: SMTP_URL, DAYBREATH_DEMO_PASSWORD: DEMO_PASSWORD },
  timeout: 180_000,
  reuseExistingServer: false,
  gracefulShutdown: { signal: 'SIGTERM', timeout: 5_000 } as const,
})

// Servers of the production build, each with its own port and database: one empty, set up by the tests as a person would; one with the demo
// hospital; one with a ward in the morning. All of them send their mail to a real SMTP server on loopback.
export default defineConfig({
  testDir: 'tests/e2e',
  outputDir: 'test-results',
  workers: 1,
  retries: 0,
  forbidOnly: true,
  timeout: 90_000,
  expect: { timeout: 10_000 },
  reporter: [['list']],
  webServer: [
    {
      command: `exec node tests/e2e/support/mailbox-server.mjs ${PORTS.smtp} ${PORTS.mailbox}`,
      url: MAILBOX_URL,
      reuseExistingServer: false,
      gracefulShutdown: { signal: 'SIGTERM', timeout: 5_000 },
    },
    server('empty', ''),
    server('ward', '--keep', `${program} tests/e2e/support/fill-ward.ts ward && `),
    server('demo', '--demo'),
  ],
  use: {
    locale: 'en-GB',
    actionTimeout: 20_000,
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
