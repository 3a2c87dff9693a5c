// npm start: real use. No demo data, no default password; refuses without a secret.
import { existsSync } from 'node:fs'
import { join } from 'node:path'
import { build } from './build.mjs'
import { main, NEXT, readPort, Refusal, ROOT, say, serve } from './process.mjs'
import { setup } from './setup.mjs'

const LEAST_SECRET = 32

/** Takes settings from .env when there is one; what is already set wins. */
export function loadSettings() {
  const file = join(ROOT, '.env')
  if (existsSync(file)) process.loadEnvFile(file)
}

/** Where the server listens and which address people type. */
export function readAddress(usualPort = 3000) {
  const port = readPort(process.env.PORT, usualPort)
  const host = process.env.DAYBREATH_HOST || '127.0.0.1'
  return { port, host, baseUrl: process.env.DAYBREATH_BASE_URL || `http://localhost:${port}` }
}

/** Arguments of a production server. */
export function serverArguments({ host, port }) {
  return [NEXT, 'start', '-H', host, '-p', String(port)]
}

async function start() {
  loadSettings()
  const { host, port, baseUrl } = readAddress()
  const secret = process.env.DAYBREATH_SECRET ?? ''
  if (secret.length < LEAST_SECRET) {
    const wrong = secret === '' ? 'is missing' : 'is too short'
    throw new Refusal(
      `Daybreath cannot start: DAYBREATH_SECRET ${wrong}.\n` +
        'Give at least 32 random characters (openssl rand -base64 32), in the environment or in a file .env; see .env.example.',
    )
  }
  await setup()
  await build()
  say(`Daybreath at ${baseUrl} (listening on ${host}:${port})`)
  const env = { NEXT_TELEMETRY_DISABLED: '1', NODE_ENV: 'production', DAYBREATH_BASE_URL: baseUrl }
  serve(serverArguments({ host, port }), env)
}

main(import.meta.url, start)
