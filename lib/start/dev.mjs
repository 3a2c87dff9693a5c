// npm run dev: the development server, on its own database below data/dev unless .env names another.
import { join } from 'node:path'
import { main, NEXT, ROOT, say, serve } from './process.mjs'
import { readOrMakeSecret } from './secret.mjs'
import { setup } from './setup.mjs'
import { loadSettings, readAddress } from './start.mjs'

async function dev() {
  loadSettings()
  await setup()
  const { host, port, baseUrl } = readAddress()
  const env = {
    NEXT_TELEMETRY_DISABLED: '1',
    DAYBREATH_BASE_URL: baseUrl,
    DAYBREATH_SECRET: process.env.DAYBREATH_SECRET || readOrMakeSecret(join(ROOT, 'data', 'dev', 'secret')),
    DAYBREATH_DATABASE: process.env.DAYBREATH_DATABASE || 'data/dev/daybreath.db',
    MAIL_FOLDER: process.env.MAIL_FOLDER || 'data/dev/mail',
  }
  say(`Development server at ${baseUrl}`)
  serve([NEXT, 'dev', '-H', host, '-p', String(port)], env)
}

main(import.meta.url, dev)
